import type { Id } from '@/lib/model/id'
import type { JobState } from '@/lib/model/job'
import type { LogBody, LogEntry, LogKind } from '@/lib/model/log-entry'
import type { Role } from '@/lib/model/role'
import { actionToMoveJob } from './job-states'
import { type Action, may, mayLog, mayStrike } from './permissions'

/**
 * The one gate of everything written in the field (R22): the phone asks before it keeps a record, the shop
 * before it takes one, so that nothing is ever kept that the shop must refuse by role.
 */
export type Writer = {
  personId: Id
  roles: readonly Role[]
  /** Checks and swaps that the code book marks safe for guides. */
  guideSafe: ReadonlySet<string>
}

/** A record as far as roles decide on it: every op of the sync is one. */
export type Deed =
  | { kind: 'machine.add' | 'job.open' | 'job.people' | 'job.machine' }
  | { kind: 'partRequest.ask' | 'advice.keep' }
  | { kind: 'job.set' | 'job.settle' | 'machine.set' | 'machine.settle' | 'machine.drop' }
  | { kind: 'partLine.add' | 'partLine.cancel' | 'partLine.quantity' | 'partRequest.drop' }
  | { kind: 'book.heard' }
  | { kind: 'job.move'; fields: { to: JobState } }
  | { kind: 'log.add'; fields: Pick<LogEntry, 'body' | 'supersedes'> }

/** True when one of the roles writes in the field at all and may do this there. */
export const mayInField = (roles: readonly Role[], action: Action): boolean =>
  may(roles, 'field.write') && may(roles, action)

/** As `mayLog`, for people in the field. */
export const mayLogInField = (
  roles: readonly Role[],
  kind: LogKind,
  guideSafe: boolean = false,
): boolean => may(roles, 'field.write') && mayLog(roles, kind, guideSafe)

/** The check or swap an entry is about, for the guide's question; null for any other entry. */
function subjectOf(body: LogBody): string | null {
  if (body.kind === 'check' || body.kind === 'reading') return body.checkId
  return body.kind === 'swap' ? body.swapId : null
}

const isGuideSafe = (body: LogBody, { guideSafe }: Writer): boolean => {
  const subject = subjectOf(body)
  return subject !== null && guideSafe.has(subject)
}

/**
 * True when the writer's roles allow the record. `target`: the entry it points back to; undefined when it
 * points to none, or to one that is not known here, which is then left to those who know it.
 */
export function mayRecord(deed: Deed, writer: Writer, target?: LogEntry): boolean {
  const { roles, personId } = writer
  switch (deed.kind) {
    case 'book.heard':
      // Whoever sees the field is told of it, and says so.
      return may(roles, 'field.see')
    case 'job.move':
      return mayInField(roles, actionToMoveJob(deed.fields.to))
    case 'log.add': {
      const { body } = deed.fields
      if (!mayLogInField(roles, body.kind, isGuideSafe(body, writer))) return false
      if (target === undefined) return true
      const of = { authorId: target.authorId, kind: target.body.kind }
      return mayStrike({ personId, roles }, { ...of, guideSafe: isGuideSafe(target.body, writer) })
    }
    default:
      return mayInField(roles, ACTION_OF[deed.kind])
  }
}

const ACTION_OF = {
  'machine.add': 'machine.add',
  'machine.set': 'machine.add',
  'machine.settle': 'machine.add',
  'machine.drop': 'machine.add',
  'job.open': 'job.open',
  'job.people': 'job.work',
  'job.machine': 'job.work',
  'job.set': 'job.work',
  'job.settle': 'job.work',
  'partRequest.ask': 'part.ask',
  'partRequest.drop': 'part.ask',
  'partLine.add': 'part.ask',
  'partLine.cancel': 'part.ask',
  'partLine.quantity': 'part.ask',
  'advice.keep': 'advice.keep',
} as const satisfies Record<Exclude<Deed['kind'], 'book.heard' | 'job.move' | 'log.add'>, Action>
