import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { UNSEPARATED } from '@/db/codebook/book'
import { listAudit } from '@/db/queries/audit'
import { changesAfter } from '@/db/queries/change-log'
import { takeChanges } from '@/db/queries/changes'
import {
  bookHash,
  itemHash,
  publishBook,
  publishedBook,
  publishedVersion,
} from '@/db/queries/code-book'
import { findDraft } from '@/db/queries/code-book-draft'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { Role } from '@/lib/model/role'
import { exportBook } from '@/lib/sync/server/book/export-book'
import { publishDraft } from '@/lib/sync/server/book/publish-draft'
import { type BookHand, leaveDraft, takeDraft } from '@/lib/sync/server/book/take-draft'
import { migrateDatabase } from '../../scripts/migrate'
import { smallRightBook } from '../support/book-fixture'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, makeShop, newId, type TestShop } from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ owner: ['owner'], mechanic: ['mechanic'] })
})
afterAll(() => test.close())

const handOf = (who: 'owner' | 'mechanic', of: TestShop = shop): BookHand => {
  const { id: personId, roles } = of.people[who] ?? { id: '', roles: [] as Role[] }
  return { actor: { shopId: of.id, personId, roles }, now: Date.parse(AT), newId }
}
const right = smallRightBook()
const bookOf = (items: CodeBookItem[]) => ({ items, unseparated: [...UNSEPARATED].slice(0, 0) })

describe('[CB32] a draft', () => {
  it('[CB32] is kept and published by those who may publish, and by nobody else', async () => {
    const hand = handOf('mechanic')
    const of = { book: bookOf(right), note: null, replace: false }
    expect(await takeDraft(hand, of)).toEqual({ ok: false, problem: { kind: 'forbidden' } })
    expect(await leaveDraft(hand)).toMatchObject({ problem: { kind: 'forbidden' } })
    expect(await publishDraft(hand)).toMatchObject({ problem: { kind: 'forbidden' } })
    expect(await publishDraft(handOf('owner'))).toMatchObject({ problem: { kind: 'noDraft' } })
  })

  it('[CB32] is one: another takes its place only when that is said', async () => {
    const hand = handOf('owner')
    const first = await takeDraft(hand, { book: bookOf(right), note: 'First', replace: false })
    expect(first).toMatchObject({ ok: true, value: { items: right.length, hash: bookHash(right) } })
    const other = bookOf(right.slice(0, 2))
    expect(await takeDraft(hand, { book: other, note: null, replace: false })).toMatchObject({
      problem: { kind: 'hasDraft' },
    })
    expect((await asShop(shop.id, findDraft))?.note).toBe('First')
    expect(await takeDraft(hand, { book: other, note: null, replace: true })).toMatchObject({
      ok: true,
    })
    expect((await exportBook(shop.id, 'draft'))?.book.items).toEqual(right.slice(0, 2))
    expect(await leaveDraft(hand)).toEqual({ ok: true, value: null })
    expect(await leaveDraft(hand)).toMatchObject({ problem: { kind: 'noDraft' } })
  })

  it('[CB33] with a finding is not published, and says what it is; put right, it is', async () => {
    const hand = handOf('owner')
    const broken = right.map((item) =>
      item.kind === 'fault' ? { ...item, system: 'nowhere' } : item,
    )
    const taken = await takeDraft(hand, { book: bookOf(broken), note: null, replace: false })
    expect(taken.ok && taken.value.findings.some(({ kind }) => kind === 'unresolved')).toBe(true)
    const refused = await publishDraft(hand)
    expect(refused).toMatchObject({ ok: false, problem: { kind: 'findings' } })
    expect(await asShop(shop.id, publishedVersion)).toBeUndefined()
    await takeDraft(hand, { book: bookOf(right), note: 'Put right', replace: true })
    const made = await publishDraft(hand)
    expect(made).toEqual({
      ok: true,
      value: { version: 1, hash: bookHash(right), publishedAt: AT },
    })
    expect((await asShop(shop.id, (tx) => publishedBook(tx)))?.items).toEqual(right)
    expect(await asShop(shop.id, findDraft)).toBeUndefined()
    const changes = await asShop(shop.id, (tx) => changesAfter(tx, { seq: 0, limit: 100 }))
    expect(changes.at(-1)).toMatchObject({ entity: 'book', id: '1' })
    const trail = await asShop(shop.id, (tx) => listAudit(tx, null))
    expect(trail.at(-1)).toMatchObject({ action: 'book.published', entityId: '1' })
    expect(trail.map(({ action }) => action)).toContain('book.draftDropped')
  })

  it('[CB33] the same again is nothing new; a change is version 2, made from version 1', async () => {
    const hand = handOf('owner')
    await takeDraft(hand, { book: bookOf(right), note: null, replace: false })
    expect(await publishDraft(hand)).toMatchObject({ problem: { kind: 'nothingNew', version: 1 } })
    const changed = right.map((item) =>
      item.kind === 'setup' ? { ...item, minutes: item.minutes + 1 } : item,
    )
    await takeDraft(hand, { book: bookOf(changed), note: null, replace: true })
    expect(await publishDraft(hand)).toMatchObject({ ok: true, value: { version: 2 } })
    const row = await asShop(shop.id, (tx) =>
      tx.selectFrom('codeBookVersion').selectAll().where('version', '=', 2).executeTakeFirst(),
    )
    expect(row).toMatchObject({ basedOn: 1, madeBy: shop.people.owner?.id })
    expect((await asShop(shop.id, (tx) => publishedBook(tx, 1)))?.items).toEqual(right)
  })

  it('[CB34] items are stored once for each content, by the hash of their canonical JSON', async () => {
    const { rows } = await asShop(shop.id, (tx) =>
      sql<{ hash: string; body: CodeBookItem }>`select hash, body from code_book_content`.execute(
        tx,
      ),
    )
    const setups = right.filter(({ kind }) => kind === 'setup').length
    for (const { hash, body } of rows) expect(itemHash(body)).toBe(hash)
    const named = await asShop(shop.id, (tx) =>
      sql<{ n: number }>`select count(*)::int as n from code_book_item`.execute(tx),
    )
    expect(named.rows[0]?.n).toBe(2 * right.length)
    const once = rows.filter(({ body }) => (body as { system?: string }).system !== 'nowhere')
    expect(once.length).toBe(right.length + setups)
  })
})

describe('[CB34] books from before items were stored once', () => {
  it('[CB34] keep their versions, items, order and hash through the migration', async () => {
    const other = await makeShop({ owner: ['owner'] })
    await asShop(other.id, async (tx) => {
      await publishBook(tx, { version: 1, items: right, publishedAt: AT, publishedBy: null })
      await takeChanges(tx, [{ entity: 'book', id: '1', jobId: null }])
    })
    const before = await asShop(other.id, (tx) => publishedBook(tx))
    await undoMigration()
    const ran = await migrateDatabase({ ownerUrl: test.ownerUrl, workUrl: test.workUrl })
    expect(ran[0]).toBe('20261203T0900_store_book_items_once')
    expect(await asShop(other.id, (tx) => publishedBook(tx))).toEqual(before)
    expect((await asShop(shop.id, (tx) => publishedBook(tx)))?.version).toBe(2)
  })
})

/** The tables as they stood before: bodies within the versions. */
async function undoMigration(): Promise<void> {
  await sql`
    drop table code_book_heard, code_book_withdrawal;
    alter table device drop column book_version;
    drop table code_book_draft_item, code_book_draft;
    alter table code_book_item add body jsonb;
    update code_book_item i set body = c.body from code_book_content c
      where c.shop_id = i.shop_id and c.hash = i.hash;
    alter table code_book_item drop column hash, alter body set not null;
    drop table code_book_content;
    alter table code_book_version drop column based_on, drop column made_by, drop column note,
      drop column unseparated;
    delete from farbench_migration.kysely_migration where name >= '20261203';
  `.execute(test.admin)
}
