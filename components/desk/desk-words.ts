import type { Role } from '@/lib/model/role'

/** What a person may be called at the desk; the other words are the phone's (field/words, parts/part-words). */
export const ROLE_WORDS: Record<Role, string> = {
  mechanic: 'mechanic',
  guide: 'guide',
  dispatcher: 'dispatcher',
  parts: 'parts desk',
  owner: 'owner',
}
