import Dexie, { type DexieOptions, type Table } from 'dexie'
import type { Id } from '@/lib/model/id'
import type { Cursor } from '@/lib/sync/protocol/message'
import type { OpKind } from '@/lib/sync/protocol/op'
import { Lifeline } from './lifeline'
import type { Sealed } from './seal'

/** The shop's row and what the screens see of it: ids, times and sync fields plain, contents sealed (R22). */
export type RowRecord = {
  /** `entity/id` */
  key: string
  entity: string
  id: string
  jobId: Id | null
  /** Of a job that was merged: the one that goes on (R13). */
  mergedInto?: Id
  /** Change number of the shop's row held in `base`; null while the shop has none. */
  seq: number | null
  /** The turn it was written in: a cheap mark of "changed". */
  turn: number
  /** Which full pull it was last seen in. */
  gen: number
  /** The shop's row. */
  base: Sealed | null
  /** Of an entry recorded here, whose `base` is its row as it was recorded: its place at the shop. */
  told?: { order: number; receivedAt: string }
  /** The row with this phone's unsent ops on top; null when that is the base itself. */
  body: Sealed | null
}

/**
 * `waiting`: to be sent. `blocked`: the shop waits for something before it. `stuck`: refused for good,
 * kept. `taken`: the shop has it, its row has not come back. `done`: kept a while, to be offered again
 * should the shop be restored from a backup (P12).
 */
export type OutboxState = 'waiting' | 'blocked' | 'stuck' | 'taken' | 'done'

export type OutboxRecord = {
  dseq: number
  opId: Id
  kind: OpKind
  jobId: Id | null
  entityId: Id
  /** Corrected time it was recorded at, ms. */
  since: number
  bytes: number
  state: OutboxState
  /** Code of a refusal, id of what it waits for. */
  reason: string | null
  detail: string | null
  /** Rows of it must be worked out again: set by a sender that cannot open rows. */
  unsettled: 0 | 1
  takenAt: number | null
  op: Sealed
}

/** A refused record that its person has given up sending: it is in every exported file from then on. */
export type LetGoRecord = Omit<OutboxRecord, 'state'> & { state: 'letGo'; letGoAt: number }

/** A photo or a voice note. Its bytes lie apart, so that what is told of it is read without them. */
export type PhotoRecord = {
  hash: string
  jobId: Id
  mime: string
  size: number
  since: number
  /** `sent`: the shop has confirmed the hash; the bytes are gone, the small copy stays. */
  state: 'waiting' | 'stuck' | 'sent'
  reason: string | null
  /** Bytes the shop has of it; null while its upload was not begun. Left out by version 1. */
  uploaded?: number | null
  /** When the shop confirmed it, ms. */
  sentAt?: number | null
  /** The small copy of a picture, sealed. */
  thumb?: Sealed | null
  /** Where version 1 kept the bytes. */
  bytes?: Sealed | null
}

export type PhotoBytesRecord = { hash: string; bytes: Sealed }

export type DraftRecord = { key: string; at: number; body: Sealed }

/** Small facts about the store, by name. */
export type MetaValues = {
  /** Counts every writing transaction: what was prepared under an older turn is prepared again. */
  turn: number
  /** Last op number and last stamp given out. */
  stamp: { dseq: number; hlc: string }
  /** Shop's clock less the phone's, ms. */
  clockOffset: number
  cursor: Cursor
  gen: number
  fetchedAt: string
  device: { deviceId: Id; enrolled: boolean }
  /** Written once when the store is made: tells an emptied store from a new one (P22). */
  canary: { id: Id; madeAt: number }
  /** The newest version of the code book on this phone, told to the shop with every exchange. */
  bookVersion: number
  /** When the tab that sends last moved (P19). */
  heartbeat: number
  setAside: { entity: string; id: string; seq: number }[]
  /** Photos and voice notes let go of: their bytes are no longer here, and the shop never had them. */
  filesLetGo: number
  /** Closed jobs that were let go of for room since the whole pull `gen` (P21). */
  dropped: { gen: number; jobIds: Id[] }
  /** What the person has not seen yet of what the shop did with their work, by job. */
  notices: Notice[]
  storageAsked: boolean
  /** Set when the store is being emptied: nothing is written into it any more. */
  wiping: 'handedOver' | 'deleted'
  /** What went with the store before this one (P22); `told` once its person has read it. */
  lost: { ops: number; lastOn: string | null; told: boolean }
  /** Other phones of this person that fell silent with unsent work (P22); `told` once it was read. */
  silent: { phones: number; ops: number; photos: number; lastAt: string; told: boolean }
}
/** `reopened`: closed at the shop, and opened again by what this phone still had to say (R13). */
export type Notice = { jobId: Id; what: 'reopened'; at: number }
export type MetaName = keyof MetaValues
type MetaRecord = { name: MetaName; value: unknown }

export type KeyRecord =
  | { name: 'device'; pair: CryptoKeyPair }
  | { name: 'outbox'; key: CryptoKey }
  /** The store key, wrapped once per way to open it; a PIN adds its own wrap and drops the device's. */
  | { name: 'store'; wraps: StoreWrap[] }
export type StoreWrap = { by: 'device'; with: CryptoKey; wrapped: ArrayBuffer }

/** Where IndexedDB comes from; tests give each phone its own. */
export type Indexed = Pick<DexieOptions, 'indexedDB' | 'IDBKeyRange'>

const OPTIONS: DexieOptions = { chromeTransactionDurability: 'strict', cache: 'disabled' }

/** Name of the store of a person in a shop. */
const phoneDbName = (shopId: Id, personId: Id) => `farbench-${shopId}-${personId}`

/** One person's store in one shop. The outbox is never rewritten by a migration (P25). */
export class PhoneDb extends Dexie {
  declare row: Table<RowRecord, string>
  declare outbox: Table<OutboxRecord, number>
  declare letGo: Table<LetGoRecord, string>
  declare photo: Table<PhotoRecord, string>
  declare photoBytes: Table<PhotoBytesRecord, string>
  declare draft: Table<DraftRecord, string>
  declare meta: Table<MetaRecord, MetaName>
  declare key: Table<KeyRecord, KeyRecord['name']>
  readonly life: Lifeline = new Lifeline(this)

  constructor(shopId: Id, personId: Id, indexed: Indexed = {}) {
    super(phoneDbName(shopId, personId), { ...OPTIONS, ...indexed })
    this.version(1).stores({
      row: 'key, entity, [entity+jobId], gen',
      outbox: 'dseq, &opId, state, jobId, unsettled',
      photo: 'hash, state, jobId',
      draft: 'key',
      meta: 'name',
      key: 'name',
    })
    this.version(2).stores({ photoBytes: 'hash' })
    this.version(3).stores({ letGo: 'opId' })
    // Another tab brings a newer version: let go, so that neither hangs (P25).
    this.on('versionchange', () => this.close({ disableAutoOpen: false }))
  }
}

/** A fact about the store, undefined when it was never written. */
export async function readMeta<N extends MetaName>(
  db: PhoneDb,
  name: N,
): Promise<MetaValues[N] | undefined> {
  return (await db.meta.get(name))?.value as MetaValues[N] | undefined
}

/** Writes a fact about the store. */
export async function writeMeta<N extends MetaName>(
  db: PhoneDb,
  name: N,
  value: MetaValues[N],
): Promise<void> {
  await db.meta.put({ name, value })
}

/** A key record, undefined when it was never written. */
export function findKey<N extends KeyRecord['name']>(
  db: PhoneDb,
  name: N,
): Promise<Extract<KeyRecord, { name: N }> | undefined> {
  return db.key.get(name) as Promise<Extract<KeyRecord, { name: N }> | undefined>
}

/** The sealed bytes of a photo, wherever they lie; null when they went after the shop confirmed them. */
export async function sealedPhoto(db: PhoneDb, photo: PhotoRecord): Promise<Sealed | null> {
  const [held] = await db.photoBytes.bulkGet([photo.hash])
  return held?.bytes ?? photo.bytes ?? null
}

/** Key of a row in the row store; also the place it is sealed for. */
export const rowKey = (entity: string, id: string) => `${entity}/${id}`
