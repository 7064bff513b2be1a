'use client'
import type { Id } from '@/lib/model/id'
import type { StoredEntry } from '@/lib/sync/client/views'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

export type { StoredEntry } from '@/lib/sync/client/views'

const OPENING = still(undefined)

/** The log of a job, oldest first: in the shop's order what was sent, then this phone's unsent lines. */
export function useLog(jobId: Id): StoredEntry[] | undefined {
  const phone = usePhone()
  return useWatch(phone === null ? OPENING : phone.log(jobId))
}
