import type { Id } from '@/lib/model/id'
import type { LogKind } from '@/lib/model/log-entry'
import type { Role } from '@/lib/model/role'

/**
 * Who may do what (product.md, "People and roles"). A person's roles are a set and what they may do is
 * the union. A screen asks here to hide a key, the server asks again for every write and every read:
 * only the second counts.
 */
export const ACTIONS = [
  'field.see',
  'field.write',
  'desk.see',
  'job.open',
  'job.work',
  'job.assign',
  'job.merge',
  'job.close',
  'job.seeAll',
  'machine.add',
  'log.add',
  'check.do',
  'check.guideSafe',
  'part.ask',
  'part.see',
  'part.work',
  'advice.keep',
  'machine.release',
  'book.propose',
  'book.publish',
  'price.set',
  'member.manage',
  'device.revoke',
  'unsent.import',
  'audit.see',
  'export.make',
  'insight.see',
] as const
export type Action = (typeof ACTIONS)[number]

const MECHANIC: readonly Action[] = [
  'field.see',
  'field.write',
  'desk.see',
  'job.open',
  'job.work',
  'job.close',
  'machine.add',
  'log.add',
  'check.do',
  'check.guideSafe',
  'part.ask',
  'advice.keep',
  'machine.release',
  'book.propose',
]
const GUIDE: readonly Action[] = [
  'field.see',
  'field.write',
  'job.open',
  'job.work',
  'log.add',
  'check.guideSafe',
  'advice.keep',
]
const DISPATCHER: readonly Action[] = [
  'field.see',
  'desk.see',
  'job.open',
  'job.work',
  'job.assign',
  'job.merge',
  'job.close',
  'job.seeAll',
  'machine.add',
  'log.add',
  'part.see',
  'unsent.import',
]
const PARTS: readonly Action[] = [
  'desk.see',
  'job.seeAll',
  'log.add',
  'part.ask',
  'part.see',
  'part.work',
]

const ALLOWED: Readonly<Record<Role, ReadonlySet<Action>>> = {
  mechanic: new Set(MECHANIC),
  guide: new Set(GUIDE),
  dispatcher: new Set(DISPATCHER),
  parts: new Set(PARTS),
  owner: new Set(ACTIONS.filter((action) => action !== 'machine.release')),
}

/** True when one of the roles allows the action. No roles: false. */
export function may(roles: readonly Role[], action: Action): boolean {
  return roles.some((role) => ALLOWED[role].has(action))
}

/** What people at the desk write into a job log: words, pictures, where people are, and corrections. */
const DESK_KINDS: ReadonlySet<LogKind> = new Set(['note', 'photo', 'voice', 'people', 'correction'])

/** A guide's entries: first look and the guide's ways out. Checks and swaps are judged by `guideSafe`. */
const GUIDE_KINDS: ReadonlySet<LogKind> = new Set([
  'symptom',
  'code',
  'codesUnreadable',
  'couldNot',
  'photo',
  'voice',
  'note',
  'people',
  'wayOut',
  'correction',
])
const GUIDE_SAFE_KINDS: ReadonlySet<LogKind> = new Set(['check', 'reading', 'swap'])

/**
 * True when one of the roles may write a log entry of this kind.
 * `guideSafe`: the check or swap the entry is about is marked safe for guides in the code book; false
 * where it is not known, which leaves the entry to people who may do every check.
 */
export function mayLog(roles: readonly Role[], kind: LogKind, guideSafe: boolean): boolean {
  if (!may(roles, 'log.add')) return false
  if (may(roles, 'check.do')) return true
  if (may(roles, 'check.guideSafe')) {
    if (GUIDE_KINDS.has(kind)) return true
    if (GUIDE_SAFE_KINDS.has(kind)) return guideSafe
  }
  return DESK_KINDS.has(kind)
}

/**
 * True when the person may take an entry out of evidence, or put another in its place: their own, or one of
 * a kind they may write themselves. Only who does every check undoes another's correction, for that brings
 * back what it had struck. `guideSafe` as for `mayLog`, of the entry that is struck.
 */
export function mayStrike(
  { personId, roles }: { personId: Id; roles: readonly Role[] },
  target: { authorId: Id; kind: LogKind; guideSafe: boolean },
): boolean {
  if (!may(roles, 'log.add')) return false
  if (target.authorId === personId) return true
  if (target.kind === 'correction') return may(roles, 'check.do')
  return mayLog(roles, target.kind, target.guideSafe)
}
