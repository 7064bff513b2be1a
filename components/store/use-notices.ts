'use client'
import { useCallback } from 'react'
import type { Id } from '@/lib/model/id'
import type { Notice } from '@/lib/sync/client/phone-db'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const NONE = still<Notice[]>([])

/** What the shop did with this person's work on a job and they have not seen, and the way to say "seen". */
export function useNotices(jobId: Id): { notices: Notice[]; seen(): Promise<void> } {
  const phone = usePhone()
  const notices = useWatch(phone === null ? NONE : phone.notices(jobId))
  const seen = useCallback(async () => {
    await phone?.noticed(jobId)
  }, [phone, jobId])
  return { notices, seen }
}
