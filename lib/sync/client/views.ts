import type { BookIndex } from '@/lib/diag/book-index'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import type { PhotoRef, VoiceRef } from '@/lib/model/photo'
import type { Instant } from '@/lib/model/time'
import type { OpKind } from '@/lib/sync/protocol/op'

/** Who uses this phone now. `signedOut`: nobody whose work the phone holds, and no session to start one. */
export type Session =
  | { kind: 'opening' }
  /** `emptied`: the shop took this phone out; all of it was handed over, then deleted (Q4). */
  | { kind: 'signedOut'; emptied?: true }
  | { kind: 'ready'; actor: Actor; shopId: Id; deviceId: Id }

/** A line of the job log as the screen shows it. `order` is its place in the shop's chain, null while unsent. */
export type StoredEntry = { entry: LogEntry; sent: boolean; order: number | null }

/**
 * Where to show a photo or play a voice note from: the bytes held here, else the shop's copy once it has
 * one. `thumb` is the small picture, held here also after the bytes went; `onPhone` when all of it is here.
 */
export type PhotoView = { url: string | null; thumb: string | null; onPhone: boolean }

/** The code books of this phone: the newest one, and which others are held for open jobs. */
export type BookView = {
  status: 'opening' | 'missing' | 'ready'
  index: BookIndex | null
  version: number | null
  versions: readonly number[]
  /** One that is held, indexed, without what was withdrawn from it; null for any other. */
  of: (version: number, taken?: readonly BookWithdrawal[]) => BookIndex | null
}

/** The bytes of a photo or a voice note to keep with an entry, and the small copy of a picture. */
export type NewPhoto = {
  hash: string
  jobId: Id
  bytes: ArrayBuffer
  mime: PhotoRef['mime'] | VoiceRef['mime']
  thumb?: ArrayBuffer
}

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
  /** Of those, how many the shop has already: of a photo or a voice note under way. */
  bytesDone: number
  since: Instant
  state: UnsentState
  /** Why it is stuck or on what it waits, in one sentence. */
  /** What it waits for, when that is on this phone too. */
  waitsFor: { what: LogBody | string; isStuck: boolean } | null
  reason: string | null
  /** Code of the refusal of a stuck one. */
  code: string | null
  /** What it says, to be copied out; null of what has no words. */
  words: string | null
}

/** Nothing moves though there seems to be a line: since when, and what is known of why (P24). */
export type Stalled = { sinceAt: Instant; why: string }

/** What must happen before the phone can hand over or fetch again; null when nothing must. */
export type Need = 'signIn' | 'updateApp' | 'refused' | 'room' | null

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
  /** Records whose person has given up sending them; they are in every exported file. */
  letGoCount: number
  /** Photos and voice notes let go of: no longer on this phone, and never at the shop. */
  filesLetGo: number
  /** Whether the shop answered the last time it was called; a hint before the first call. */
  online: boolean
  /** Nothing has moved for a quarter of an hour though there is signal; null while all is well. */
  stalled: Stalled | null
  /** Whether the browser promised to keep the store; null while it was not asked. */
  storageKept: boolean | null
  /** Share of the room the browser grants that is used, 0 to 1; null when it does not say. */
  quotaShare: number | null
  /** Bytes still free; null when the browser does not say. */
  freeBytes: number | null
  needs: Need
  /** When everything of the shop was last fetched whole; null before the first time. */
  fetchedAt: Instant | null
  /** Rows of the shop this version could not read: kept aside, not shown. */
  setAside: number
  /** False when the last keystrokes could not be kept: the phone has no room. */
  draftsKept: boolean
}
