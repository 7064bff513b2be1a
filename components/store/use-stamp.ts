'use client'
import { useMemo } from 'react'
import type { Id } from '@/lib/model/id'
import type { LogBody } from '@/lib/model/log-entry'
import { AppError } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import type { OpInput } from '@/lib/sync/protocol/op'
import { usePhone, useStore } from './store-provider'
import { useBook } from './use-book'

export type Stamp = {
  newId(): Id
  /** Now, by the phone's clock put right by the shop's. */
  now(): Instant
  zone: string
  /** One line of the job log with author, phone, times and versions filled in. */
  entry(
    jobId: Id,
    body: LogBody,
    extra?: { happenedAt?: Instant; supersedes?: Id; bookVersion?: number },
  ): OpInput & { kind: 'log.add' }
}

/** What every record is stamped with. */
export function useStamp(): Stamp {
  const store = useStore()
  const phone = usePhone()
  const { version } = useBook()
  return useMemo(
    () => ({
      newId: () => store.ports.ids.next(),
      now: () => phone?.stamp.instant() ?? new Date(store.ports.clock.now()).toISOString(),
      zone: store.ports.zone(),
      entry: (jobId, body, extra) => {
        if (phone === null) throw new AppError('nobodyAtWork')
        return phone.entry(jobId, body, { bookVersion: version, ...extra })
      },
    }),
    [store, phone, version],
  )
}
