import Dexie, { type Table } from 'dexie'
import type { CodeBook } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Indexed } from './phone-db'

/**
 * The code book on the phone (rule R24), by shop. A whole version is one record, so a newer one comes in by one
 * write: the old one stays until the new one is read, checked and whole, and after that for as long as an open
 * job holds it. What fetches versions is `book-fetch.ts`, which pages load only where there is no worker.
 */
export type HeldVersion = {
  shopId: Id
  version: number
  /** SHA-256 of the canonical JSON of its items. */
  hash: string
  /** The version as the shop serves it whole. */
  text: string
}

/** The versions that open jobs of a person of this phone hold. */
export type BookNeed = { shopId: Id; personId: Id; versions: number[] }

/** What version 1 of the store held: the newest version alone. It is read until another one comes in. */
type OldRecord = { shopId: Id; version: number; etag: string | null; text: string }

export class BookDb extends Dexie {
  declare book: Table<OldRecord, Id>
  declare held: Table<HeldVersion, [Id, number]>
  declare need: Table<BookNeed, [Id, Id]>

  constructor(indexed: Indexed = {}) {
    super('farbench-book', { chromeTransactionDurability: 'strict', cache: 'disabled', ...indexed })
    this.version(1).stores({ book: 'shopId' })
    this.version(2).stores({ held: '[shopId+version], shopId', need: '[shopId+personId], shopId' })
    this.on('versionchange', () => this.close({ disableAutoOpen: false }))
  }
}

/** Every version held of a shop, the oldest first. */
export async function heldVersions(db: BookDb, shopId: Id): Promise<HeldVersion[]> {
  const held = await db.held.where('shopId').equals(shopId).toArray()
  if (held.length > 0) return held.sort((a, b) => a.version - b.version)
  const [old] = await db.book.where('shopId').equals(shopId).toArray()
  if (old === undefined) return []
  const { version, text } = old
  return [{ shopId, version, hash: (JSON.parse(text) as CodeBook).hash, text }]
}
