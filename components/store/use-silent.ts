'use client'
import { useMemo } from 'react'
import { type SilentPhones, silentIsRead, watchSilent } from '@/lib/sync/client/lost'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const NOTHING = still(null)
const report = (cause: unknown) => globalThis.reportError?.(cause)

/** Other phones of this person that fell silent with unsent work (P22), and the word that it was read. */
export function useSilent(): { silent: SilentPhones | null; read(): void } {
  const phone = usePhone()
  const watch = useMemo(
    () => (phone === null ? NOTHING : watchSilent(phone.core.db, report)),
    [phone],
  )
  const silent = useWatch(watch)
  return { silent, read: () => void (phone && silentIsRead(phone.core.db).catch(report)) }
}
