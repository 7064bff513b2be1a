import type { BookIndex } from '@/lib/diag/book-index'
import type { Id } from '@/lib/model/id'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import type { PhotoRef } from '@/lib/model/photo'
import type { Instant } from '@/lib/model/time'
import type { OpKind } from '@/lib/sync/protocol/op'

/** Who uses this phone now. `signedOut`: nobody whose work the phone holds, and no session to start one. */
export type Session =
  | { kind: 'opening' }
  | { kind: 'signedOut' }
  | { kind: 'ready'; actor: Actor; shopId: Id; deviceId: Id }

/** A line of the job log as the screen shows it. `order` is its place in the shop's chain, null while unsent. */
export type StoredEntry = { entry: LogEntry; sent: boolean; order: number | null }

/** A photo's address to show it from; `onPhone` when its bytes are held here. */
export type PhotoView = { url: string | null; onPhone: boolean }

/** The code book this phone works with. */
export type BookView = {
  status: 'opening' | 'missing' | 'ready'
  index: BookIndex | null
  version: number | null
}

/** The bytes of a photo to keep with an entry. */
export type NewPhoto = { hash: string; jobId: Id; bytes: ArrayBuffer; mime: PhotoRef['mime'] }

type UnsentState = 'waiting' | 'sending' | 'stuck' | 'blocked'

/** One thing this phone has not handed over. `opId` of a record, `hash` of a photo. */
export type UnsentItem = {
  key: string
  opId: string | null
  hash: string | null
  kind: OpKind | 'photoBytes'
  jobId: Id | null
  /** A line of the job log as it was written; of anything else a few plain words. */
  what: LogBody | string
  bytes: number
  since: Instant
  state: UnsentState
  reason: string | null
}

/** What must happen before the phone can hand over or fetch again; null when nothing must. */
export type Need = 'signIn' | 'updateApp' | 'refused' | null

/** Everything about unsent work, for the mark at the top and the screen behind it. */
export type UnsentView = {
  /** False while the store is being opened: then nothing may be said about what is sent. */
  counted: boolean
  count: number
  bytes: number
  oldestAt: Instant | null
  items: UnsentItem[]
  stuckCount: number
  sending: { done: number; total: number } | null
  /** Whether the shop answered the last time it was called; a hint before the first call. */
  online: boolean
  /** Whether the browser promised to keep the store; null while it was not asked. */
  storageKept: boolean | null
  /** Share of the room the browser grants that is used, 0 to 1; null when it does not say. */
  quotaShare: number | null
  needs: Need
  /** When everything of the shop was last fetched whole; null before the first time. */
  fetchedAt: Instant | null
  /** Rows of the shop this version could not read: kept aside, not shown. */
  setAside: number
  /** False when the last keystrokes could not be kept: the phone has no room. */
  draftsKept: boolean
}
