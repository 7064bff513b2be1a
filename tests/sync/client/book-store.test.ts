import { describe, expect, test } from 'vitest'
import { bookHash, itemHash, type PlacedItem } from '@/db/queries/code-book'
import type { CodeBookItem } from '@/lib/model/code-book'
import { type Network, networkOf } from '@/lib/ports/network'
import { type BookAsk, fetchBook, type Needs } from '@/lib/sync/client/book-fetch'
import { BookDb, heldVersions } from '@/lib/sync/client/book-store'
import { watchBook } from '@/lib/sync/client/book-watch'
import type { Indexed } from '@/lib/sync/client/phone-db'
import type { BookView } from '@/lib/sync/client/views'
import { changesBetween, withContents } from '@/lib/sync/server/book/make-patch'
import { MECHANIC, newIndexed, noTimer } from '../../support/phone'

const { shopId, personId } = MECHANIC
const word = (id: string, name = id): CodeBookItem => ({
  kind: 'part',
  id,
  name,
  source: 'from memory',
})
const BOOKS: Readonly<Record<number, CodeBookItem[]>> = {
  1: [word('coil')],
  2: [word('coil'), word('plug')],
  3: [word('plug', 'Spark plug'), word('coil')],
}
const publishedAt = '2026-11-24T18:40:00.000Z'
const itemsOf = (version: number) => BOOKS[version] ?? []
const placed = (version: number): PlacedItem[] =>
  itemsOf(version).map((item, n) => ({
    kind: item.kind,
    itemId: item.id,
    place: n + 1,
    hash: itemHash(item),
  }))
const wholeOf = (version: number) => ({
  version,
  hash: bookHash(itemsOf(version)),
  publishedAt,
  items: itemsOf(version),
})

/** What the shop answers when `newest` is its newest version (the same rule as the route's). */
function answerOf(path: string, newest: number): string {
  const asked = new URL(path, 'http://shop.invalid').searchParams
  const version = Number(asked.get('version') ?? newest)
  const from = Object.keys(BOOKS).find((n) => bookHash(itemsOf(Number(n))) === asked.get('from'))
  if (from === undefined) return JSON.stringify(wholeOf(version))
  const { drop, put, move } = changesBetween(placed(Number(from)), placed(version))
  const contents = new Map(itemsOf(version).map((item) => [itemHash(item), item]))
  const { items: _, ...head } = wholeOf(version)
  return JSON.stringify({
    ...head,
    from: asked.get('from'),
    drop,
    put: withContents(put, contents),
    move,
  })
}

const json = { headers: { 'content-type': 'application/json' } }
type Answer = (path: string, headers: Headers) => Response | Promise<Response>
const asked: string[] = []

function shopWith(answer: Answer): Network {
  return networkOf({
    fetch: (path, init) => {
      asked.push(String(path))
      return Promise.resolve(answer(String(path), new Headers(init?.headers)))
    },
    online: () => true,
    timer: noTimer,
  })
}
const serve = (newest: number): Network =>
  shopWith((path, headers) =>
    headers.get('if-none-match') === `"${bookHash(itemsOf(newest))}"`
      ? new Response(null, { status: 304 })
      : new Response(answerOf(path, newest), json),
  )

const ready = (db: BookDb) =>
  new Promise<{ version: number | null; words: string[]; versions: readonly number[] }>(
    (resolve, reject) => {
      const book = watchBook(db, shopId, reject)
      const leave = book.subscribe(() => {
        const { version, versions, index } = book.get()
        queueMicrotask(leave)
        resolve({ version, versions, words: [...(index?.words.keys() ?? [])] })
      })
    },
  )
const fetchFrom = (db: BookDb, network: Network, ask: Partial<BookAsk> = {}) =>
  fetchBook(db, network, { shopId, ...ask })
const needing = (versions: number[], knows: number | null): Needs => ({ personId, versions, knows })

describe('[R24] the code book on the phone', () => {
  test('is kept whole, asked for by what changed since, and renewed', async () => {
    const db = new BookDb(newIndexed())
    expect((await ready(db)).version).toBe(null)
    expect(await fetchFrom(db, serve(1))).toBe('new')
    expect(await fetchFrom(db, serve(1))).toBe('same')
    expect(await ready(db)).toEqual({ version: 1, versions: [1], words: ['part:coil'] })
    asked.length = 0
    expect(await fetchFrom(db, serve(2))).toBe('new')
    expect(asked).toEqual([`/api/codebook?from=${bookHash(itemsOf(1))}`])
    expect(await ready(db)).toMatchObject({ version: 2, words: ['part:coil', 'part:plug'] })
    expect(await fetchFrom(db, serve(3))).toBe('new')
    const [held] = (await heldVersions(db, shopId)).slice(-1)
    expect(JSON.parse(held?.text ?? '')).toEqual(wholeOf(3))
  })

  test.each<[string, Answer, string]>([
    ['cut in the middle', (path) => new Response(answerOf(path, 2).slice(0, 40), json), 'notWhole'],
    [
      'without items',
      () => new Response(JSON.stringify({ ...wholeOf(2), items: [] }), json),
      'notWhole',
    ],
    [
      'with an item that is none',
      () => new Response(JSON.stringify({ ...wholeOf(2), items: [4] }), json),
      'notWhole',
    ],
    [
      'bent by one letter',
      () => new Response(JSON.stringify(wholeOf(2)).replace('plug', 'plag'), json),
      'notWhole',
    ],
    [
      'bent in what changed',
      (path) => new Response(answerOf(path, 2).replace('"put":[[1', '"put":[[0'), json),
      'notWhole',
    ],
    [
      'made from another one than is held',
      (path) => new Response(answerOf(path, 2).replace(bookHash(itemsOf(1)), 'f'.repeat(64)), json),
      'notWhole',
    ],
    [
      'a portal’s page',
      () => new Response('<html/>', { headers: { 'content-type': 'text/html' } }),
      'notReached',
    ],
    ['refused', () => new Response('{}', { ...json, status: 401 }), 'notReached'],
    [
      'an older one',
      () => new Response(JSON.stringify({ ...wholeOf(1), version: 0 }), json),
      'same',
    ],
    ['no line', () => Promise.reject(new TypeError('Failed to fetch')), 'notReached'],
  ])('the old version stays when the new one is %s', async (_words, answer, outcome) => {
    const db = new BookDb(newIndexed())
    await fetchFrom(db, serve(1))
    expect(await fetchFrom(db, shopWith(answer))).toBe(outcome)
    expect(await ready(db)).toEqual({ version: 1, versions: [1], words: ['part:coil'] })
  })

  test('[P25] what an older app kept is read, and renewed by what changed since', async () => {
    const indexed = newIndexed()
    const db = new BookDb(indexed)
    await db.book.put({ shopId, version: 1, etag: null, text: JSON.stringify(wholeOf(1)) })
    expect(await ready(db)).toEqual({ version: 1, versions: [1], words: ['part:coil'] })
    expect(await fetchFrom(db, serve(2))).toBe('new')
    expect(await db.book.count()).toBe(0)
    expect((await ready(db)).versions).toEqual([1, 2])
  })
})

describe('[CB39] versions that open jobs hold', () => {
  test('[CB39] stay beside the newest, and go when no open job holds them', async () => {
    const db = new BookDb(newIndexed())
    await fetchFrom(db, serve(1), { needs: needing([], null) })
    await fetchFrom(db, serve(2), { needs: needing([1], 1) })
    expect((await ready(db)).versions).toEqual([1, 2])
    await fetchFrom(db, serve(3), { needs: needing([1], 2) })
    await fetchFrom(db, serve(3), { needs: needing([1], 3) })
    expect((await ready(db)).versions).toEqual([1, 3])
    await fetchFrom(db, serve(3), { needs: needing([], 3) })
    expect((await ready(db)).versions).toEqual([3])
  })

  test('[CB39] are fetched when this phone has them not, and held for another person too', async () => {
    const db = new BookDb(newIndexed())
    await fetchFrom(db, serve(3), { needs: needing([1], null) })
    expect((await ready(db)).versions).toEqual([1, 3])
    const other = { personId: '01980000-0000-7000-8000-000000000106', versions: [], knows: 3 }
    await fetchFrom(db, serve(3), { needs: other })
    expect((await ready(db)).versions).toEqual([1, 3])
  })

  test('[CB39] nothing goes while the page did not know of the newest: a job may just have begun', async () => {
    const db = new BookDb(newIndexed())
    await fetchFrom(db, serve(1), { needs: needing([], null) })
    await fetchFrom(db, serve(2), { needs: needing([], 1) })
    expect((await ready(db)).versions).toEqual([1, 2])
    await fetchFrom(db, serve(2), { needs: needing([], 2) })
    expect((await ready(db)).versions).toEqual([2])
  })
})

test('[CB41] a book is read without what was withdrawn, and is one object until that changes', async () => {
  const db = new BookDb(newIndexed())
  await fetchFrom(db, serve(2))
  const view = await new Promise<BookView>((resolve, reject) => {
    const book = watchBook(db, shopId, reject)
    const leave = book.subscribe(() => {
      queueMicrotask(leave)
      resolve(book.get())
    })
  })
  const whole = view.of(2)
  expect(view.of(1)).toBeNull()
  expect(view.of(2, [])).toBe(whole)
  const one = {
    id: personId,
    what: 'fault',
    itemId: 'coil',
    name: 'Coil',
    reason: 'Wrong.',
  } as const
  const rest = { instead: null, at: publishedAt, by: null, versions: [2], upTo: 2, heard: [] }
  const taken = [{ ...one, ...rest }]
  const without = view.of(2, taken)
  expect(without).not.toBe(whole)
  expect(without?.withdrawn).toEqual([personId])
  expect(view.of(2, taken)).toBe(without)
  const heard = [{ ...one, ...rest, heard: [{ personId, at: publishedAt }] }]
  expect(view.of(2, heard)).toBe(without)
})

/** A start of the store that stops dead at its nth step; answers the names of the steps it passed. */
async function stopAt(indexed: Indexed, at: number): Promise<{ passed: string[]; died: boolean }> {
  const passed: string[] = []
  const db = new BookDb(indexed)
  const step = (name: string) => {
    passed.push(name)
    if (passed.length === at) throw new Error('killed')
  }
  const needs = needing([1], 1)
  const died = await fetchFrom(db, serve(2), { needs, step }).then(
    () => false,
    () => true,
  )
  db.close()
  return { passed, died }
}

test('[CB40] cut off at any step, the old version is there whole, and the next look has the new one', async () => {
  const seen = new Set<string>()
  for (let at = 1; ; at++) {
    const indexed = newIndexed()
    const first = new BookDb(indexed)
    await fetchFrom(first, serve(1))
    first.close()
    const { passed, died } = await stopAt(indexed, at)
    for (const name of passed) seen.add(name)
    const db = new BookDb(indexed)
    const held = await heldVersions(db, shopId)
    // Every version that is there is whole, and the old one is always there.
    for (const { version, hash, text } of held) {
      expect(hash).toBe(bookHash(itemsOf(version)))
      expect(JSON.parse(text)).toEqual(wholeOf(version))
    }
    expect(held[0]?.version).toBe(1)
    await fetchFrom(db, serve(2), { needs: needing([1], 1) })
    expect((await ready(db)).versions).toEqual([1, 2])
    db.close()
    if (!died) break
  }
  expect([...seen]).toEqual([
    'needsKept',
    'held',
    'answered',
    'checked',
    'oldKept',
    'newKept',
    'oldRecordGone',
    'kept',
    'pruned',
  ])
})
