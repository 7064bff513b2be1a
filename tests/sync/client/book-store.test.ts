import { describe, expect, test } from 'vitest'
import { networkOf } from '@/lib/ports/network'
import { BookDb, fetchBook, watchBook } from '@/lib/sync/client/book-store'
import { MECHANIC, newIndexed, noTimer } from '../../support/phone'

const word = (id: string) => ({ kind: 'part', id, name: id, source: 'from memory' })
const bookOf = (version: number, ids: string[]) =>
  JSON.stringify({
    version,
    hash: `h${version}`,
    publishedAt: '2026-11-24T18:40:00.000Z',
    items: ids.map(word),
  })

function shopWith(answer: (headers: Headers) => Response | Promise<Response>) {
  return networkOf({
    fetch: (_path, init) => Promise.resolve(answer(new Headers(init?.headers))),
    online: () => true,
    timer: noTimer,
  })
}

const serve = (version: number, ids: string[]) =>
  shopWith((headers) =>
    headers.get('if-none-match') === `"${version}"`
      ? new Response(null, { status: 304 })
      : new Response(bookOf(version, ids), {
          headers: { 'content-type': 'application/json', etag: `"${version}"` },
        }),
  )

const ready = (db: BookDb) =>
  new Promise<{ version: number | null; words: string[] }>((resolve, reject) => {
    const book = watchBook(db, MECHANIC.shopId, reject)
    const leave = book.subscribe(() => {
      const view = book.get()
      queueMicrotask(leave)
      resolve({ version: view.version, words: [...(view.index?.words.keys() ?? [])] })
    })
  })

describe('[R24] the code book on the phone', () => {
  test('is kept whole, asked for by its tag, and renewed', async () => {
    const db = new BookDb(newIndexed())
    expect((await ready(db)).version).toBe(null)
    expect(await fetchBook(db, serve(1, ['coil']), MECHANIC.shopId)).toBe('new')
    expect(await fetchBook(db, serve(1, ['coil']), MECHANIC.shopId)).toBe('same')
    expect(await ready(db)).toEqual({ version: 1, words: ['part:coil'] })
    expect(await fetchBook(db, serve(2, ['coil', 'plug']), MECHANIC.shopId)).toBe('new')
    expect(await ready(db)).toEqual({ version: 2, words: ['part:coil', 'part:plug'] })
  })

  test.each([
    ['cut in the middle', () => new Response(bookOf(2, ['coil']).slice(0, 40), json), 'notWhole'],
    ['without items', () => new Response(bookOf(2, []), json), 'notWhole'],
    [
      'with an item that is none',
      () => new Response(JSON.stringify({ version: 2, items: [4] }), json),
      'notWhole',
    ],
    [
      'a portal’s page',
      () => new Response('<html/>', { headers: { 'content-type': 'text/html' } }),
      'notReached',
    ],
    ['refused', () => new Response('{}', { ...json, status: 401 }), 'notReached'],
    ['an older one', () => new Response(bookOf(0, ['coil']), json), 'same'],
    ['no line', () => Promise.reject(new TypeError('Failed to fetch')), 'notReached'],
  ])('the old version stays when the new one is %s', async (_words, answer, outcome) => {
    const db = new BookDb(newIndexed())
    await fetchBook(db, serve(1, ['coil']), MECHANIC.shopId)
    expect(await fetchBook(db, shopWith(answer), MECHANIC.shopId)).toBe(outcome)
    expect(await ready(db)).toEqual({ version: 1, words: ['part:coil'] })
  })
})

const json = { headers: { 'content-type': 'application/json' } }
