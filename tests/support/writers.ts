// Writers that take change numbers, and what to read them by.
import { asShop } from '@/db/client'
import { changesAfter } from '@/db/queries/change-log'
import { type Change, takeChanges } from '@/db/queries/changes'
import { insertMachines } from '@/db/queries/machines'
import { machineOf, makeShop, type TestShop } from './shop-fixture'

export const machineChange = (id: string): Change => ({ entity: 'machine', id, jobId: null })
export const owned = () => makeShop({ owner: ['owner'] })
export const wait = (ms: number) => new Promise((done) => setTimeout(done, ms))
/** The SQLSTATE an attempt ends with. */
export const codeOf = (promise: Promise<unknown>) =>
  promise.then(
    () => 'no error',
    (error: { code?: string }) => error.code ?? String(error),
  )
/** Writes one machine; waits a while between writing and numbering, and again before the commit. */
export const write = (shop: TestShop, id: string, [before, after] = [0, 0]) =>
  asShop(shop.id, async (tx) => {
    await insertMachines(tx, [machineOf(id)])
    await wait(before)
    const seq = await takeChanges(tx, [machineChange(id)])
    await wait(after)
    return seq
  })

/** Every change number of the shop, as stored. */
export const numbersOf = async (shop: TestShop) =>
  (await asShop(shop.id, (tx) => changesAfter(tx, { seq: 0, limit: 100_000 }))).map(
    ({ seq }) => seq,
  )
/** Delays from a seed, so that a failure can be had again. */
export function seededDelays(seed: number) {
  let state = seed
  return (most: number) => {
    state = (state * 1103515245 + 12345) % 2147483648
    return (state / 2147483648) * most
  }
}
export const oneTo = (last: number) => Array.from({ length: last }, (_, n) => n + 1)
