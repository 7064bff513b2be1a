import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import { withoutWithdrawn } from '@/lib/diag/withdrawn'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { CodeBook } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { type BookDb, type HeldVersion, heldVersions } from './book-store'
import { liveCell } from './live'
import type { BookView } from './views'
import type { Watch } from './watch'

const OPENING: BookView = {
  status: 'opening',
  index: null,
  version: null,
  versions: [],
  of: () => null,
}
const MISSING: BookView = { ...OPENING, status: 'missing' }

/**
 * The books of a shop, indexed for the engine, on asking without what was withdrawn from them (R23). Pages fetch this
 * file when their store is open: no first screen waits for it; each version is read and indexed once, when it is
 * wanted.
 */
export function watchBook(
  db: BookDb,
  shopId: Id,
  failed: (cause: unknown) => void,
): Watch<BookView> {
  const indexes = new Map<string, BookIndex>()
  return liveCell<HeldVersion[], BookView>({
    initial: OPENING,
    read: () => heldVersions(db, shopId),
    open: (held) => {
      const newest = held.at(-1)
      if (newest === undefined) return MISSING
      const whole = (version: number): BookIndex | null => {
        const one = held.find((other) => other.version === version)
        if (one === undefined) return null
        const key = `${one.version} ${one.hash}`
        const index = indexes.get(key) ?? indexBook(JSON.parse(one.text) as CodeBook)
        indexes.set(key, index)
        return index
      }
      const of: BookView['of'] = (version, taken = NONE) => indexWithout(whole(version), taken)
      const versions = held.map(({ version }) => version)
      return { status: 'ready', index: of(newest.version), version: newest.version, versions, of }
    },
    failed,
  })
}

const NONE: readonly BookWithdrawal[] = []

/** One index for one book and one list of withdrawals: the engine is sent it only when it is another. */
const made = new WeakMap<BookIndex, { taken: readonly BookWithdrawal[]; index: BookIndex }>()

function indexWithout(whole: BookIndex | null, taken: readonly BookWithdrawal[]): BookIndex | null {
  if (whole === null || taken.length === 0) return whole
  const last = made.get(whole)
  if (last?.taken === taken) return last.index
  const next = withoutWithdrawn(whole, taken)
  // A row that came again, with nothing new for this book, is no new book.
  const same = last !== undefined && last.index.withdrawn.join() === next.withdrawn.join()
  const index = same ? last.index : next
  made.set(whole, { taken, index })
  return index
}
