import type { JSONColumnType } from 'kysely'
import type { LogBody, LogKind } from '@/lib/model/log-entry'

/** Insert only. `canonical` is what `hash` covers; the other columns repeat it for queries. */
export type LogEntryTable = {
  shopId: string
  id: string
  jobId: string
  orderNo: number
  supersedes: string | null
  happenedAt: string
  writtenAt: string
  zone: string
  authorId: string
  deviceId: string
  engineVersion: string
  bookVersion: number | null
  kind: LogKind
  body: JSONColumnType<LogBody>
  receivedAt: string
  canonical: string
  prevHash: string | null
  hash: string
}

/** Insert only. `chain` is the job's id, or the shop's for what belongs to no job. */
export type AuditEntryTable = {
  shopId: string
  id: string
  chain: string
  jobId: string | null
  orderNo: number
  at: string
  actorId: string | null
  deviceId: string | null
  action: string
  entity: string
  entityId: string
  detail: JSONColumnType<Record<string, unknown>>
  canonical: string
  prevHash: string | null
  hash: string
}
