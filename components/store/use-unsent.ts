'use client'
import { useMemo } from 'react'
import { AppError } from '@/lib/model/result'
import { NOTHING_UNSENT } from '@/lib/sync/client/unsent'
import type { UnsentView } from '@/lib/sync/client/views'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

export type { UnsentItem, UnsentView } from '@/lib/sync/client/views'

const OPENING = still(NOTHING_UNSENT)

/** Unsent work, and the two things a person can do about it. */
export function useUnsent(): UnsentView & {
  trySending(): Promise<void>
  exportFile(): Promise<Blob>
} {
  const phone = usePhone()
  const view = useWatch(phone === null ? OPENING : phone.unsent)
  return useMemo(
    () => ({
      ...view,
      trySending: async () => {
        await phone?.sender.sendNow('tap')
      },
      exportFile: () => {
        if (phone === null) throw new AppError('nobodyAtWork')
        return phone.exportFile()
      },
    }),
    [view, phone],
  )
}
