'use client'
import { useMemo } from 'react'
import { type Lost, lostIsRead, watchLost } from '@/lib/sync/client/lost'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const NOTHING = still(null)
const report = (cause: unknown) => globalThis.reportError?.(cause)

/** Work that went with the store before this one (P22), and the word that it was read. */
export function useLost(): { lost: Lost | null; read(): void } {
  const phone = usePhone()
  const watch = useMemo(
    () => (phone === null ? NOTHING : watchLost(phone.core.db, report)),
    [phone],
  )
  const lost = useWatch(watch)
  return { lost, read: () => void (phone && lostIsRead(phone.core.db).catch(report)) }
}
