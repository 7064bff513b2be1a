// The database's own guard of values and merges (D12): numbers, one standing value, both ends of a merge.
import { sql } from 'kysely'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop, type ShopTx } from '@/db/client'
import { type Change, takeChanges } from '@/db/queries/changes'
import { openTestDatabase, type TestDatabase } from '../support/database'
import { AT, makeJob, makeShop, newId, type TestShop } from '../support/shop-fixture'

let test: TestDatabase
let shop: TestShop
let jobId: string
let otherId: string
beforeAll(async () => {
  test = await openTestDatabase()
  shop = await makeShop({ owner: ['owner'] })
  jobId = await makeJob(shop, shop.people.owner!)
  otherId = await makeJob(shop, shop.people.owner!)
})
afterAll(() => test.close())

const codeOf = (promise: Promise<unknown>) =>
  promise.then(
    () => 'no error',
    (error: { code?: string }) => error.code ?? String(error),
  )
const writing = (run: (tx: ShopTx) => Promise<unknown>, changes: Change[]) =>
  codeOf(
    asShop(shop.id, async (tx) => {
      await run(tx)
      await takeChanges(tx, changes)
    }),
  )
const write =
  (entity: string, entityId: string, state = 'current') =>
  (tx: ShopTx) =>
    sql`insert into field_history (shop_id, id, entity, entity_id, field, value, ordered_hlc, clock_odd,
      written_at, received_at, after_seq, state)
    values (${shop.id}, ${newId()}, ${entity}, ${entityId}, 'weather', '{"is":"fog"}',
      '000000000000-0000', false, ${AT}, ${AT}, 1, ${state})`.execute(tx)
const ofJob = (id: string, whole = false): Change => ({ entity: 'job', id, jobId: id, whole })

describe('[D12] values and merges', () => {
  it('[D12] [P7] a write of a value without the number of its row is refused, for each kind of row', async () => {
    const machine: Change = { entity: 'machine', id: shop.machineId, jobId: null }
    expect(await writing(write('job', jobId, 'lost'), [])).toBe('FB002')
    expect(await writing(write('job', jobId, 'lost'), [machine])).toBe('FB002')
    expect(await writing(write('machine', shop.machineId), [ofJob(jobId)])).toBe('FB002')
    expect(await writing(write('partRequest', newId()), [ofJob(jobId)])).toBe('FB002')
    expect(await writing(write('machine', shop.machineId), [machine])).toBe('no error')
    const look = (tx: ShopTx) => sql`update field_history set state = 'replaced'`.execute(tx)
    expect(await writing(look, [ofJob(jobId)])).toBe('FB002')
  })

  it('[D12] one value of a field stands at a time, and what was written is not taken away', async () => {
    expect(await writing(write('job', jobId), [ofJob(jobId)])).toBe('no error')
    expect(await writing(write('job', jobId), [ofJob(jobId)])).toBe('23505')
    const remove = (tx: ShopTx) => sql`delete from field_history`.execute(tx)
    expect(await writing(remove, [ofJob(jobId)])).toBe('42501')
  })

  it('[D12] [P11] a merge numbers the job whole, and points nowhere but at another job of the shop', async () => {
    const merge = (into: string | null, root: string | null) => (tx: ShopTx) =>
      tx
        .updateTable('job')
        .set({ mergedInto: into, mergedRoot: root })
        .where('id', '=', jobId)
        .execute()
    expect(await writing(merge(otherId, otherId), [ofJob(jobId)])).toBe('FB003')
    expect(await writing(merge(jobId, jobId), [ofJob(jobId, true)])).toBe('23514')
    expect(await writing(merge(otherId, null), [ofJob(jobId, true)])).toBe('23514')
    expect(await writing(merge(newId(), otherId), [ofJob(jobId, true)])).toBe('23503')
    expect(await writing(merge(otherId, otherId), [ofJob(jobId, true)])).toBe('no error')
  })

  it('[D12] a row has one standing merge', async () => {
    const note = (tx: ShopTx) =>
      sql`insert into merging (shop_id, id, entity, entity_id, into_id, merged_at, merged_by, people)
        values (${shop.id}, ${newId()}, 'job', ${jobId}, ${otherId}, ${AT}, ${shop.people.owner!.id},
          '{}')`.execute(tx)
    expect(await writing(note, [])).toBe('no error')
    expect(await writing(note, [])).toBe('23505')
  })
})
