'use client'
import { useMemo } from 'react'
import { holdsIn } from '@/lib/diag/withdrawn-in'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import { useStore } from './store-provider'
import { useWithdrawals } from './use-rows'
import { useSession } from './use-session'
import { useWatch } from './use-watch'

/** A withdrawal that holds in no book of this phone is told for so long (a choice): it held in one lately. */
const LATELY_MS = 90 * 24 * 3_600_000

/** Withdrawals that the person at work has not acknowledged yet, the oldest first (R23). */
export function useUnheard(): BookWithdrawal[] {
  const store = useStore()
  const session = useSession()
  const { versions } = useWatch(store.book)
  const taken = useWithdrawals()
  const me = session.kind === 'ready' ? session.actor.personId : null
  return useMemo(() => {
    const since = store.ports.clock.now() - LATELY_MS
    const concerns = (one: BookWithdrawal) =>
      Date.parse(one.at) > since || versions.some((version) => holdsIn(one, version))
    return taken
      .filter((one) => !one.heard.some(({ personId }) => personId === me) && concerns(one))
      .sort((a, b) => a.at.localeCompare(b.at))
  }, [store, taken, versions, me])
}
