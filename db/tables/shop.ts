import type { Generated } from 'kysely'

/** The shop's settings. Amounts in minor units of `currency`. */
export type ShopTable = {
  shopId: string
  name: string
  zone: string
  currency: string
  perMinuteMinor: number
  towMinor: number
  recoveryMinor: number
  emergencyNumber: string
  phone: string
  createdAt: Generated<string>
  updatedAt: Generated<string>
}

/** The counter that numbers a shop's changes and jobs; moved by SQL functions only. */
export type ShopCounterTable = {
  shopId: string
  epoch: Generated<string>
  seq: Generated<number>
  lastJobNumber: Generated<number>
  /** Highest change number of purged tombstones: an older cursor pulls anew (P10). */
  horizon: Generated<number>
}

/** One numbered change (docs/spec/data.md). Written by take_changes only. */
export type ChangeLogTable = {
  shopId: string
  seq: number
  entity: string
  entityId: string
  jobId: string | null
  state: 'present' | 'deleted'
  whole: boolean
  writtenBy: Generated<string>
  changedAt: Generated<string>
}
