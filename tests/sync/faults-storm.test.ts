// Fault 26 of the fault list: what is fair when everybody comes back at once. How long it takes is measured
// by the benchmark (B7), as a ratio of one run.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST } from '@/app/api/sync/route'
import { asShop } from '@/db/client'
import { jobOpen, logAdd, machineAdd, note as noteBody } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)

describe('[fault 26] everybody comes back at once', () => {
  const PHONES = 50
  const BATCHES = 4
  const LINES = 25

  /** Sends one batch until all of it is taken, as a phone does that is told to retry or to come back. */
  async function sendAll(from: RawDevice, ops: { id: string }[]): Promise<void> {
    let waiting = ops
    while (waiting.length > 0) {
      const answer = await POST(from.push(waiting))
      if (answer.status === 503) continue
      expect(answer.status).toBe(200)
      const said = (await answer.json()) as { taken: string[]; results: { result: string }[] }
      const odd = said.results.filter(({ result }) => result !== 'retry' && result !== 'duplicate')
      expect(odd).toEqual([])
      waiting = waiting.filter((op) => !said.taken.includes(op.id))
    }
  }

  it('[fault 26] [P4] [P7] [P16] 50 phones with 100 ops each: 5,000 stored once, numbers dense, none starves', async () => {
    const phones: Awaited<ReturnType<typeof phoneOf>>[] = []
    for (let i = 0; i < PHONES; i += 1) phones.push(await phoneOf(world.a, 'mechanic'))
    const bystander = await phoneOf(world.b, 'mechanic')
    const reader = await phoneOf(world.a, 'owner')
    await pullAll(reader.device, reader.cookie)
    const done: { phone: number; batch: number }[] = []
    const made: string[] = []
    const one = async (device: RawDevice, phone: number) => {
      const opening = jobOpen(world.a.machineId)
      for (let batch = 0; batch < BATCHES; batch += 1) {
        const lines = Array.from({ length: batch === 0 ? LINES - 1 : LINES }, (_, i) =>
          device.op(logAdd(device, opening.fields.id, noteBody(`${phone} ${batch} ${i}`))),
        )
        const ops = batch === 0 ? [device.op(opening), ...lines] : lines
        made.push(...ops.map((op) => op.id))
        await sendAll(device, ops)
        done.push({ phone, batch })
      }
    }
    const storm = Promise.all(phones.map(({ device }, phone) => one(device, phone)))
    const op = bystander.device.op(machineAdd())
    expect((await sync(bystander.device, [op], { cookie: bystander.cookie })).taken).toEqual([
      op.id,
    ])
    // Another shop’s phone is heard while the storm goes on, and not after it.
    expect(done.length).toBeLessThan(PHONES * BATCHES)
    await storm
    const stored = await inA((tx) =>
      tx
        .selectFrom('syncOp')
        .select(['opId', 'outcome'])
        .where(
          'deviceId',
          'in',
          phones.map(({ device }) => device.id),
        )
        .execute(),
    )
    expect(stored).toHaveLength(PHONES * BATCHES * LINES)
    expect(new Set(stored.map((row) => row.opId))).toEqual(new Set(made))
    expect(new Set(stored.map((row) => row.outcome))).toEqual(new Set(['accepted']))
    // Fair: whoever is done first, everybody has been heard at least once by then.
    const first = done.findIndex(({ batch }) => batch === BATCHES - 1)
    const heard = new Set(done.slice(0, first + 1).map(({ phone }) => phone))
    expect(heard.size).toBe(PHONES)
    const told = await pullAll(reader.device, reader.cookie)
    expect(told.filter((row) => row.entity === 'logEntry')).toHaveLength(
      PHONES * (BATCHES * LINES - 1),
    )
    await expectWholeShop(world.a.id)
  }, 60_000)
})
