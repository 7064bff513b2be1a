import type { ColumnType } from 'kysely'

/** What became of an op for good (P6). `blocked` waits for its parent, `quarantined` for the owner. */
export type OpOutcome = 'accepted' | 'merged' | 'rejected' | 'blocked' | 'quarantined'

/** An op as it was sent, with its lasting outcome. */
export type SyncOpTable = {
  shopId: string
  opId: string
  deviceId: string
  dseq: number
  personId: string
  kind: string
  entityId: string | null
  jobId: string | null
  raw: string
  outcome: OpOutcome
  code: string | null
  field: string | null
  detail: string | null
  blockedOn: string | null
  loser: ColumnType<unknown, string | null, string | null>
  receivedAt: string
  settledAt: string | null
}

/** A recommendation as the engine gave it; `inputs` and `shown` are its own JSON, unchanged (R23). */
export type AdviceTable = {
  shopId: string
  id: string
  jobId: string
  at: string
  engineVersion: string
  bookVersion: number
  inputs: string
  shown: string
  acted: 'followed' | 'overridden'
  chose: string
  reason: string | null
  personId: string
  deviceId: string | null
  receivedAt: string
}
