import type { Generated, JSONColumnType } from 'kysely'

/** A write of a value that several people may write; `value` is `{is: ...}` (docs/spec/sync.md, M1). */
export type FieldHistoryTable = {
  shopId: string
  id: string
  entity: 'job' | 'machine' | 'partRequest'
  entityId: string
  field: string
  value: JSONColumnType<{ is: unknown }>
  claimedHlc: string | null
  orderedHlc: string
  clockOdd: boolean
  deviceId: string | null
  dseq: number | null
  personId: string | null
  writtenAt: string
  receivedAt: string
  afterSeq: number
  state: 'current' | 'replaced' | 'lost'
  lostAfter: number | null
  lookedAt: string | null
  lookedBy: string | null
}

/** One merge of a job or machine into another, and its undoing. */
export type MergingTable = {
  shopId: string
  id: string
  entity: 'job' | 'machine'
  entityId: string
  intoId: string
  mergedAt: string
  mergedBy: string
  people: Generated<string[]>
  undoneAt: string | null
  undoneBy: string | null
}
