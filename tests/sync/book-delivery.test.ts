import { gzipSync } from 'node:zlib'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { GET as getBook } from '@/app/api/codebook/route'
import { asShop } from '@/db/client'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { takeChanges } from '@/db/queries/changes'
import { bookHash, itemHash, type PlacedItem, publishBook } from '@/db/queries/code-book'
import type { CodeBook, CodeBookItem } from '@/lib/model/code-book'
import { hashOfItems, patched } from '@/lib/sync/client/book-patch'
import { bookManifest, bookPatch } from '@/lib/sync/protocol/book'
import { changesBetween, withContents } from '@/lib/sync/server/book/make-patch'
import { openSyncWorld, type SyncWorld, signIn } from '../support/sync-world'

let world: SyncWorld
let cookie: string
beforeAll(async () => {
  world = await openSyncWorld()
  cookie = (await signIn(world.a, 'guide')).cookie
})
afterAll(() => world.close())

const publish = (version: number, items: readonly CodeBookItem[]) =>
  asShop(world.a.id, async (tx) => {
    const publishedAt = '2026-11-24T18:40:00.000Z'
    await publishBook(tx, { version, items, publishedAt, publishedBy: null })
    await takeChanges(tx, [{ entity: 'book', id: String(version), jobId: null }])
  })
const ask = (query: string, headers: Record<string, string> = {}) => {
  const url = `http://shop.invalid/api/codebook${query}`
  return getBook(new Request(url, { headers: { cookie, ...headers } }))
}
/** A check of the book said anew: what a trade change looks like. */
const changedCheck = (items: readonly CodeBookItem[]): CodeBookItem[] => {
  const at = items.findIndex((item) => item.kind === 'check')
  return items.map((item, n) =>
    n === at && item.kind === 'check' ? { ...item, minutes: item.minutes + 1 } : item,
  )
}

describe('[CB36] the book on the wire', () => {
  it('[CB36] whole under 400 kB and one changed check under 3 kB, gzip', async () => {
    await publish(1, BOOK_ITEMS)
    const whole = await (await ask('')).text()
    expect(gzipSync(whole).byteLength).toBeLessThan(400_000)
    const next = changedCheck(BOOK_ITEMS)
    await publish(2, next)
    const text = await (await ask(`?from=${bookHash(BOOK_ITEMS)}`)).text()
    expect(gzipSync(text).byteLength).toBeLessThan(3_000)
    const patch = bookPatch.parse(JSON.parse(text))
    expect(patch).toMatchObject({ version: 2, drop: [], move: [] })
    expect(patch.put).toHaveLength(1)
    const held = (JSON.parse(whole) as CodeBook).items
    expect(patched(held, patch)).toEqual(next)
    expect(await hashOfItems(patched(held, patch))).toBe(patch.hash)
  })

  it('[CB36] 304 to who holds it, the whole book to whom the shop does not know, any version from any', async () => {
    const [first, second] = [bookHash(BOOK_ITEMS), bookHash(changedCheck(BOOK_ITEMS))]
    const same = await ask(`?from=${second}`, { 'if-none-match': `"${second}"` })
    expect(same.status).toBe(304)
    const strange = (await (await ask(`?from=${'0'.repeat(64)}`)).json()) as CodeBook
    expect(strange.items).toHaveLength(BOOK_ITEMS.length)
    const back = bookPatch.parse(await (await ask(`?from=${second}&version=1`)).json())
    expect(back).toMatchObject({ version: 1, hash: first, from: second })
    const none = bookPatch.parse(await (await ask(`?from=${first}&version=1`)).json())
    expect(none).toMatchObject({ drop: [], put: [], move: [] })
  })

  it('[CB36] the manifest names the hash of every item', async () => {
    const manifest = bookManifest.parse(await (await ask('?as=manifest&version=1')).json())
    expect(Object.keys(manifest.items)).toHaveLength(BOOK_ITEMS.length)
    const [item] = BOOK_ITEMS
    expect(item && manifest.items[`${item.kind}:${item.id}`]).toBe(item && itemHash(item))
  })
})

describe('[CB37] what changed between two versions', () => {
  const word = (id: string, name: string): CodeBookItem => ({
    kind: 'part',
    id,
    name,
    source: 'from memory',
  })
  const book = fc.uniqueArray(
    fc.tuple(fc.constantFrom('a', 'b', 'c', 'd', 'e', 'f', 'g', 'h'), fc.constantFrom('x', 'y')),
    { selector: ([id]) => id },
  )
  const items = (of: [string, string][]) => of.map(([id, name]) => word(id, name))
  const placed = (of: CodeBookItem[]): PlacedItem[] =>
    of.map((item, n) => ({ kind: item.kind, itemId: item.id, place: n + 1, hash: itemHash(item) }))

  it('[CB37] turns any book into any other, items and order, by as few items as can be', () => {
    fc.assert(
      fc.property(book, book, (a, b) => {
        const [before, after] = [items(a), items(b)]
        const { drop, put, move } = changesBetween(placed(before), placed(after))
        const contents = new Map(after.map((item) => [itemHash(item), item]))
        const head = { version: 2, hash: bookHash(after), publishedAt: '', from: bookHash(before) }
        const patch = { ...head, drop, put: withContents(put, contents), move }
        expect(patched(before, patch)).toEqual(after)
        // Nothing whose content is held travels again.
        const held = new Set(before.map(itemHash))
        expect(put.some(([, hash]) => held.has(hash))).toBe(false)
      }),
      { seed: 20261203, numRuns: 500 },
    )
  })
})
