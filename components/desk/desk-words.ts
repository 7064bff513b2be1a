import type { PartLineState, PartRequest } from '@/lib/model/part-request'
import type { Role } from '@/lib/model/role'

/** Words the desk needs besides those of the field (components/field/words.ts). */
export const LINE_WORDS: Record<PartLineState, string> = {
  asked: 'Asked',
  identified: 'Identified',
  quoted: 'Quoted',
  ordered: 'Ordered',
  promised: 'Promised',
  received: 'Received',
  allocated: 'Allocated',
  dispatched: 'Dispatched',
  fitted: 'Fitted',
  returned: 'Returned',
  credited: 'Credited',
  cancelled: 'Cancelled',
}

export const CHOICE_WORDS = {
  genuine: 'Genuine',
  aftermarket: 'Aftermarket',
  either: 'Either',
} as const

export const URGENCY_WORDS: Record<PartRequest['urgency'], string> = {
  now: 'Now',
  today: 'Today',
  thisWeek: 'This week',
}

export const ROLE_WORDS: Record<Role, string> = {
  mechanic: 'mechanic',
  guide: 'guide',
  dispatcher: 'dispatcher',
  parts: 'parts desk',
  owner: 'owner',
}
