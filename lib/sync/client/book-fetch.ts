import type { CodeBook } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Network } from '@/lib/ports/network'
import { type BookPatch, bookPatch } from '@/lib/sync/protocol/book'
import { type HeldItem, hashOfItems, patched } from './book-patch'
import { type BookDb, type HeldVersion, heldVersions } from './book-store'

/** How a look for a newer book ended. */
export type BookFetch = 'new' | 'same' | 'notReached' | 'notWhole'

/**
 * What the page knows of the jobs: versions that open ones of this person hold, and the newest version it knew
 * of when it looked. Only then may old versions go.
 */
export type Needs = { personId: Id; versions: number[]; knows: number | null }

/** What is asked of the shop's books. `step` is called between any two waits; tests let it throw. */
export type BookAsk = { shopId: Id; needs?: Needs; step?: (name: string) => void }

type Asking = { db: BookDb; network: Network; shopId: Id; step: (name: string) => void }

/**
 * Asks the shop for a newer code book, by what changed since the one that is held; then for older versions that
 * open jobs hold and this phone does not; then lets go of those that no open job holds any more. Each version
 * comes in whole, by one write, when its items have the hash it must have.
 */
export async function fetchBook(
  db: BookDb,
  network: Network,
  { shopId, needs, step = none }: BookAsk,
): Promise<BookFetch> {
  const asking: Asking = { db, network, shopId, step }
  if (needs !== undefined) {
    const { personId, versions } = needs
    await db.need.put({ shopId, personId, versions })
    step('needsKept')
  }
  const held = await heldVersions(db, shopId)
  step('held')
  const newest = held.at(-1)
  const fetched = await fetchOne(asking, newest ?? null, null)
  for (const version of missing(needs, held)) {
    const base = newest ?? null
    if (fetched !== 'notReached') await fetchOne(asking, base, version)
  }
  if (needs !== undefined) await prune(asking, needs)
  return fetched
}

const none = (): void => undefined

const missing = (needs: Needs | undefined, held: readonly HeldVersion[]): number[] =>
  (needs?.versions ?? []).filter((wanted) => !held.some(({ version }) => version === wanted))

/** One version, or the newest (null), put beside what is held. */
async function fetchOne(
  { db, network, shopId, step }: Asking,
  base: HeldVersion | null,
  wanted: number | null,
): Promise<BookFetch> {
  const query = [
    ...(wanted === null ? [] : [`version=${wanted}`]),
    ...(base === null ? [] : [`from=${base.hash}`]),
  ]
  const isNewest = wanted === null && base !== null
  const sent = await network.send({
    method: 'GET',
    path: `/api/codebook${query.length === 0 ? '' : `?${query.join('&')}`}`,
    ...(isNewest ? { headers: { 'if-none-match': `"${base.hash}"` } } : {}),
  })
  step('answered')
  if (!sent.ok) return 'notReached'
  const { status, text, contentType } = sent.value
  if (status === 304) return 'same'
  if (status !== 200 || !contentType.includes('json')) return 'notReached'
  const book = bookIn(text, base)
  if (book === null || (await hashOfItems(book.items)) !== book.hash) return 'notWhole'
  step('checked')
  if (wanted === null && base !== null && base.version > book.version) return 'same'
  await db.transaction('rw', db.held, db.book, async () => {
    // What an older app kept in its own place comes along, as an open job may hold it.
    if (
      base !== null &&
      (await db.held.where('[shopId+version]').equals([shopId, base.version]).count()) === 0
    )
      await db.held.put(base)
    step('oldKept')
    const { version, hash } = book
    await db.held.put({ shopId, version, hash, text: JSON.stringify(book) })
    step('newKept')
    await db.book.delete(shopId)
    step('oldRecordGone')
  })
  step('kept')
  return 'new'
}

/** The book an answer holds, whole or by what changed since the base; null when it is cut or something else. */
function bookIn(text: string, base: HeldVersion | null): Whole | null {
  let read: unknown
  try {
    read = JSON.parse(text)
  } catch {
    return null
  }
  if (isWhole(read)) return read
  const patch = bookPatch.safeParse(read)
  if (!patch.success || patch.data.from !== base?.hash) return null
  return afterPatch(base, patch.data)
}

type Whole = Pick<CodeBook, 'version' | 'hash' | 'publishedAt'> & { items: HeldItem[] }

function afterPatch(base: HeldVersion, patch: BookPatch): Whole {
  const { version, hash, publishedAt } = patch
  const { items } = JSON.parse(base.text) as Whole
  return { version, hash, publishedAt, items: patched(items, patch) }
}

function isWhole(read: unknown): read is Whole {
  if (typeof read !== 'object' || read === null || !('items' in read)) return false
  const { version, hash, items } = read as Partial<Record<keyof Whole, unknown>>
  if (!Number.isInteger(version) || typeof hash !== 'string' || !Array.isArray(items)) return false
  return items.length > 0 && items.every(isItem)
}

const isItem = (item: unknown): boolean =>
  typeof item === 'object' &&
  item !== null &&
  'kind' in item &&
  'id' in item &&
  typeof item.kind === 'string' &&
  typeof item.id === 'string'

/**
 * Lets go of versions that are neither the newest nor held by an open job of anybody on this phone. A page that
 * did not know of the newest version yet may have begun a job with the one before: then nothing goes.
 */
async function prune({ db, shopId, step }: Asking, needs: Needs): Promise<void> {
  await db.transaction('rw', db.held, db.need, async () => {
    const keys = (await db.held.where('shopId').equals(shopId).primaryKeys()).map(([, v]) => v)
    const newest = Math.max(...keys)
    if (keys.length === 0 || needs.knows !== newest) return
    const held = await db.need.where('shopId').equals(shopId).toArray()
    const wanted = new Set([newest, ...held.flatMap(({ versions }) => versions)])
    const going = keys.filter((version) => !wanted.has(version))
    await db.held.bulkDelete(going.map((version): [Id, number] => [shopId, version]))
  })
  step('pruned')
}
