'use client'
import { useMemo } from 'react'
import type { Bag } from '@/lib/model/bag'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { MachineRow } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import type { MeterProfile } from '@/lib/model/meter-profile'
import type { PartRequestRow } from '@/lib/model/part-request'
import type { Person } from '@/lib/model/person'
import type { Shop } from '@/lib/model/shop'
import type { RowOf, StoredEntity } from '@/lib/sync/client/entities'
import { usePhone } from './store-provider'
import { still, useWatch } from './use-watch'

const OPENING = still(undefined)

/** Rows of one entity, of one job when it is named; undefined while opening. */
function useRows<E extends StoredEntity>(entity: E, jobId?: Id): RowOf<E>[] | undefined {
  const phone = usePhone()
  return useWatch(phone === null ? OPENING : phone.rows(entity, jobId))
}

/** The shop; undefined while opening and before it was fetched once. */
export const useShop = (): Shop | undefined => useRows('shop')?.[0]

/** Every job this phone holds that stands for itself, newest first. */
export function useJobs(): Job[] | undefined {
  const rows = useRows('job')
  return useMemo(
    () =>
      rows
        ?.filter((row) => row.mergedInto === undefined)
        .sort((a, b) => b.openedAt.localeCompare(a.openedAt)),
    [rows],
  )
}

/** One job; null when this phone does not hold it. */
export function useJob(id: Id): Job | null | undefined {
  const rows = useRows('job')
  return useMemo(() => rows && (rows.find((row) => row.id === id) ?? null), [rows, id])
}

/** Machines; one that was merged shows, under its own id, what stands for it (R13). */
export function useMachines(): MachineRow[] | undefined {
  const rows = useRows('machine')
  return useMemo(() => {
    const byId = new Map(rows?.map((row) => [row.id, row]))
    return rows?.map((row) => {
      const lead = row.mergedInto === undefined ? undefined : byId.get(row.mergedInto)
      return lead === undefined ? row : { ...lead, id: row.id, mergedInto: lead.id }
    })
  }, [rows])
}

export const useModels = (): MachineModel[] | undefined => useRows('machineModel')

export const useMeters = (): MeterProfile[] | undefined => useRows('meterProfile')

/** Safety withdrawals from the code book, the same list until one of them changes (R23). */
export const useWithdrawals = (): readonly BookWithdrawal[] => useRows('bookWithdrawal') ?? NONE
const NONE: readonly BookWithdrawal[] = []

/** Every entry of the logs on this phone, in no order; undefined while opening. */
export const useAllEntries = (): LogEntry[] | undefined => useRows('logEntry')

export const usePeople = (): Person[] | undefined => useRows('person')

/** The bag of the person at work; null when the shop has none for them. */
export function useBag(): Bag | null | undefined {
  const phone = usePhone()
  const rows = useRows('bag')
  return rows && (rows.find((row) => row.personId === phone?.actor.personId) ?? null)
}

/** Part requests of a job and of those merged into it, oldest first. */
export function usePartRequests(jobId: Id): PartRequestRow[] | undefined {
  const rows = useRows('partRequest', jobId)
  return useMemo(
    () =>
      rows
        ?.filter((row) => row.takenBack !== true)
        .sort((a, b) => a.askedAt.localeCompare(b.askedAt)),
    [rows],
  )
}
