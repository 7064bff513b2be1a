import type { Role } from '@/lib/model/role'

/** What a role is called on a screen. */
const ROLE_WORDS: Record<Role, string> = {
  mechanic: 'mechanic',
  guide: 'guide',
  dispatcher: 'dispatcher',
  parts: 'parts desk',
  owner: 'owner',
}

/** A person's roles in words, in the order they are held: "mechanic, parts desk". Empty for none. */
export const rolesInWords = (roles: readonly Role[]): string =>
  roles.map((role) => ROLE_WORDS[role]).join(', ')
