import Dexie, { type Table } from 'dexie'
import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import type { CodeBook } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Network } from '@/lib/ports/network'
import { liveCell } from './live'
import type { Indexed } from './phone-db'
import type { BookView } from './views'
import type { Watch } from './watch'

/**
 * The code book on the phone (rule R24), one for each shop. A whole version is one record, so a newer
 * one takes its place in one write: the old one stays until the new one is read, checked and whole.
 */
export type BookRecord = {
  shopId: Id
  version: number
  etag: string | null
  /** The version as the shop serves it. */
  text: string
}

export class BookDb extends Dexie {
  declare book: Table<BookRecord, Id>

  constructor(indexed: Indexed = {}) {
    super('farbench-book', { chromeTransactionDurability: 'strict', cache: 'disabled', ...indexed })
    this.version(1).stores({ book: 'shopId' })
    this.on('versionchange', () => this.close({ disableAutoOpen: false }))
  }
}

/** How a look for a newer book ended. */
export type BookFetch = 'new' | 'same' | 'notReached' | 'notWhole'

/** Asks the shop for a newer code book and keeps it when it is whole. */
export async function fetchBook(db: BookDb, network: Network, shopId: Id): Promise<BookFetch> {
  const [held] = await db.book.where('shopId').equals(shopId).toArray()
  const tag = held?.etag ?? null
  const sent = await network.send({
    method: 'GET',
    path: '/api/codebook',
    ...(tag === null ? {} : { headers: { 'if-none-match': tag } }),
  })
  if (!sent.ok) return 'notReached'
  const { status, text, contentType, header } = sent.value
  if (status === 304) return 'same'
  if (status !== 200 || !contentType.includes('json')) return 'notReached'
  const book = wholeBook(text)
  if (book === null) return 'notWhole'
  if (held !== undefined && held.version > book.version) return 'same'
  await db.book.put({ shopId, version: book.version, etag: header('etag'), text })
  return 'new'
}

/** The book in a text; null when the text is cut or is something else. */
function wholeBook(text: string): CodeBook | null {
  let read: unknown
  try {
    read = JSON.parse(text)
  } catch {
    return null
  }
  if (typeof read !== 'object' || read === null) return null
  const { version, items } = read as { version?: unknown; items?: unknown }
  if (!Number.isInteger(version) || !Array.isArray(items) || items.length === 0) return null
  return items.every(isItem) ? (read as CodeBook) : null
}

const isItem = (item: unknown): boolean =>
  typeof item === 'object' &&
  item !== null &&
  typeof (item as { kind?: unknown }).kind === 'string' &&
  typeof (item as { id?: unknown }).id === 'string'

const OPENING: BookView = { status: 'opening', index: null, version: null }
const MISSING: BookView = { status: 'missing', index: null, version: null }

/** The book of a shop, indexed for the engine; read and indexed once for each version. */
export function watchBook(
  db: BookDb,
  shopId: Id,
  failed: (cause: unknown) => void,
): Watch<BookView> {
  let last: { version: number; index: BookIndex } | null = null
  return liveCell<BookRecord[], BookView>({
    initial: OPENING,
    read: () => db.book.where('shopId').equals(shopId).toArray(),
    open: ([held]) => {
      if (held === undefined) return MISSING
      if (last?.version !== held.version) {
        last = { version: held.version, index: indexBook(JSON.parse(held.text) as CodeBook) }
      }
      return { status: 'ready', index: last.index, version: last.version }
    },
    failed,
  })
}
