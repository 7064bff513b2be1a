import { describe, expect, test } from 'vitest'
import { getMany } from '@/lib/sync/client/get-many'
import { numbersIn, ON_TOP, recordsIn } from '@/lib/sync/client/outbox'
import { type OutboxRecord, PhoneDb } from '@/lib/sync/client/phone-db'
import { MECHANIC, newIndexed } from '../../support/phone'
import { newId } from '../../support/shop-fixture'

const STATES = ['waiting', 'blocked', 'stuck', 'taken', 'done'] as const

const recordOf = (dseq: number): OutboxRecord => ({
  dseq,
  opId: newId(),
  kind: 'log.add',
  jobId: newId(),
  entityId: newId(),
  since: dseq,
  bytes: 1,
  state: STATES[dseq % STATES.length] ?? 'done',
  reason: null,
  detail: null,
  unsettled: 0,
  takenAt: null,
  op: new Uint8Array(1),
})

/** A store with so many records, a fifth of them in each state. */
async function storeOf(count: number): Promise<PhoneDb> {
  const db = new PhoneDb(MECHANIC.shopId, MECHANIC.personId, newIndexed())
  await db.outbox.bulkPut(Array.from({ length: count }, (_, index) => recordOf(index + 1)))
  return db
}

describe('[P2] the outbox', () => {
  test('tells the records of some states in the order of their numbers', async () => {
    const db = await storeOf(20)
    const told = await recordsIn(db, 'stuck', 'waiting')
    expect(told.map(({ dseq }) => dseq)).toEqual([2, 5, 7, 10, 12, 15, 17, 20])
    expect(await recordsIn(db)).toEqual([])
  })

  test('all but done lies on top', async () => {
    const db = await storeOf(10)
    const numbers = await numbersIn(db, ...ON_TOP)
    expect(numbers.sort((a, b) => a - b)).toEqual([1, 2, 3, 5, 6, 7, 8, 10])
  })
})

describe('many records by their numbers', () => {
  const numbersOf = async (db: PhoneDb, keys: number[]) =>
    (await getMany(db.outbox, keys, (record) => record.dseq)).map((record) => record?.dseq)

  test.each([
    ['none', []],
    ['few', [3, 1, 2]],
    ['many in a row, in their order, with one that is not there', [...seq(40).reverse(), 301]],
    ['many far apart', seq(40).map((n) => n * 7)],
    ['many of a store that ends before them', seq(40).map((n) => n + 290)],
  ])('%s', async (_, keys) => {
    const db = await storeOf(300)
    expect(await numbersOf(db, keys)).toEqual(keys.map((key) => (key <= 300 ? key : undefined)))
  })
})

function seq(count: number): number[] {
  return Array.from({ length: count }, (_, index) => index + 1)
}
