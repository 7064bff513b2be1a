'use client'
import { guideSafeOf } from '@/lib/diag/guide-safe'
import type { LogEntry, LogKind } from '@/lib/model/log-entry'
import { mayInField, mayLogInField, mayRecord } from '@/lib/shop/may-record'
import type { Action } from '@/lib/shop/permissions'
import { useBook } from '../store/use-book'
import { useSession } from '../store/use-session'

/** Whether the person at work may write such a line here; the store and the shop ask again for every one. */
export function useMayLog(kind: LogKind, guideSafe = false): boolean {
  const session = useSession()
  return session.kind === 'ready' && mayLogInField(session.actor.roles, kind, guideSafe)
}

/** Whether the person at work may do it here, in the field. */
export function useMay(action: Action): boolean {
  const session = useSession()
  return session.kind === 'ready' && mayInField(session.actor.roles, action)
}

/** Whether the person at work may take this entry out of evidence: their own, or of a kind they may write. */
export function useMayCorrect(entry: LogEntry | undefined): boolean {
  const session = useSession()
  const { index } = useBook()
  if (session.kind !== 'ready' || entry === undefined) return false
  const { roles, personId } = session.actor
  const fields = { body: { kind: 'correction', reason: '' } as const, supersedes: entry.id }
  const writer = { roles, personId, guideSafe: guideSafeOf(index) }
  return mayRecord({ kind: 'log.add', fields }, writer, entry)
}

/** Said instead of the keys: why they are not there. */
export function NotYours({ what }: { what: string }) {
  const writes = useMay('field.write')
  return (
    <p className="border-l-4 border-ink pl-3 font-bold">
      {writes
        ? `${what} is for a mechanic. Hand the job over, or write down what you saw as a note.`
        : `${what} is for those who work in the field. With your roles you read along here.`}
    </p>
  )
}
