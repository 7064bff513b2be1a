'use client'
import type { LogKind } from '@/lib/model/log-entry'
import { type Action, may, mayLog } from '@/lib/shop/permissions'
import { useSession } from '../store/use-session'

/** Whether the person at work may write such a line; the shop asks again for every one. */
export function useMayLog(kind: LogKind, guideSafe = false): boolean {
  const session = useSession()
  return session.kind === 'ready' && mayLog(session.actor.roles, kind, guideSafe)
}

export function useMay(action: Action): boolean {
  const session = useSession()
  return session.kind === 'ready' && may(session.actor.roles, action)
}

/** Said instead of the keys: why they are not there. */
export function NotYours({ what }: { what: string }) {
  return (
    <p className="border-l-4 border-ink pl-3 font-bold">
      {what} is for a mechanic. Hand the job over, or write down what you saw as a note.
    </p>
  )
}
