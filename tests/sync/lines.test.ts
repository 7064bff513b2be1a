// Part lines as a set with counters, and rows taken back (M6 to M8), through the real handlers.
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { changePartLine } from '@/db/queries/desk-writes'
import { listFieldWrites } from '@/db/queries/field-history'
import { machinesById } from '@/db/queries/machines'
import { findPartRequest } from '@/db/queries/part-requests'
import type { Actor } from '@/lib/model/person'
import { ok } from '@/lib/model/result'
import { cancelLine, countLine } from '@/lib/shop/part-count'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { type Asked, lineOf, opsOf } from '../support/field-sets'
import { AT, newId } from '../support/shop-fixture'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

type Phone = Awaited<ReturnType<typeof phoneOf>>
const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const requestNow = (of: Asked) => inA((tx) => findPartRequest(tx, of.requestId))
const linesNow = async (of: Asked) =>
  (await requestNow(of))?.lines.map(({ words, quantity, state }) => [words, quantity, state])

/** A request of two coils, held by two phones, with the number of its row. */
async function asked(): Promise<{
  one: Phone
  two: Phone
  of: Asked
  lineId: string
  base: number
}> {
  const one = await phoneOf(world.a, 'mechanic')
  const two = await phoneOf(world.a, 'second')
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  const line = lineOf({ words: 'Ignition coil', quantity: 2 })
  const request = partRequestAsk(jobId, { lines: [line] })
  await sync(one.device, [one.device.op(opening), one.device.op(request)])
  const rows = await pullAll(two.device, two.cookie)
  const requestId = request.fields.id
  const base = rows.find((row) => row.id === requestId)?.seq ?? 0
  return { one, two, of: { jobId, requestId }, lineId: line.id, base }
}

/** The parts desk moves the line on, as its screen would. */
async function deskMoves(of: Asked, lineId: string, state: 'identified' | 'ordered') {
  const actor: Actor = {
    shopId: world.a.id,
    personId: world.a.people.parts?.id ?? '',
    roles: ['parts'],
    name: null,
  }
  const stamp = { auditId: newId(), at: AT }
  const moved = await changePartLine(actor, { requestId: of.requestId, lineId, stamp }, (line) =>
    ok({ state, number: line.number, price: line.price }),
  )
  expect(moved.ok).toBe(true)
}

describe('lines of a request', () => {
  it('[M6] lines of two phones both stay, in whatever order they come', async () => {
    const { one, two, of } = await asked()
    const plug = opsOf(one.device).addLine(of, lineOf({ words: 'Spark plug' }))
    const belt = opsOf(two.device).addLine(of, lineOf({ words: 'Drive belt', quantity: 1 }))
    await sync(two.device, [belt])
    await sync(one.device, [plug])
    expect(await linesNow(of)).toEqual([
      ['Ignition coil', 2, 'asked'],
      ['Drive belt', 1, 'asked'],
      ['Spark plug', 2, 'asked'],
    ])
  })

  it('[M6] quantities are added up, not overwritten', async () => {
    const { one, two, of, lineId } = await asked()
    await sync(one.device, [opsOf(one.device).countLine(of, lineId, 2)])
    await sync(two.device, [opsOf(two.device).countLine(of, lineId, -1)])
    expect(await linesNow(of)).toEqual([['Ignition coil', 3, 'asked']])
  })

  it('[M6] counted down to nothing it is cancelled, and counted up it is asked for again', async () => {
    const { one, two, of, lineId } = await asked()
    await sync(one.device, [opsOf(one.device).countLine(of, lineId, -2)])
    expect(await linesNow(of)).toEqual([['Ignition coil', 1, 'cancelled']])
    await sync(two.device, [opsOf(two.device).countLine(of, lineId, 1)])
    expect(await linesNow(of)).toEqual([['Ignition coil', 1, 'asked']])
  })

  it('[M6] the sum is the same in every order', () => {
    const steps = fc.array(fc.integer({ min: -5, max: 5 }), { minLength: 2, maxLength: 6 })
    fc.assert(
      fc.property(steps, fc.nat(), (by, turn) => {
        const start = { state: 'asked', quantity: 3, wanted: null, countedOut: false } as const
        const run = (list: readonly number[]) =>
          list.reduce((line, one) => countLine(line, one) ?? line, { ...start } as Parameters<
            typeof countLine
          >[0])
        const at = turn % by.length
        const other = [...by.slice(at), ...by.slice(0, at)].toReversed()
        expect(run(other)).toEqual(run(by))
      }),
      { seed: 1512, numRuns: 300 },
    )
  })

  it('[M7] [fault 16] what is ordered is not cancelled or counted: the present state is told', async () => {
    const { one, of, lineId } = await asked()
    await deskMoves(of, lineId, 'identified')
    expect((await sync(one.device, [opsOf(one.device).countLine(of, lineId, 1)])).results).toEqual(
      [],
    )
    await deskMoves(of, lineId, 'ordered')
    const cancel = opsOf(one.device).cancelLine(of, lineId)
    const count = opsOf(one.device).countLine(of, lineId, 1)
    expect((await sync(one.device, [cancel, count])).results).toMatchObject([
      { opId: cancel.id, code: 'stale_status', detail: 'ordered' },
      { opId: count.id, code: 'stale_status', detail: 'ordered' },
    ])
    expect(await linesNow(of)).toEqual([['Ignition coil', 3, 'ordered']])
  })

  it('[M6] cancelled on two phones it is cancelled once', async () => {
    const { one, two, of, lineId } = await asked()
    await sync(one.device, [opsOf(one.device).cancelLine(of, lineId)])
    const again = await sync(two.device, [opsOf(two.device).cancelLine(of, lineId)])
    expect(again.results).toEqual([])
    expect(cancelLine({ state: 'ordered', quantity: 1, wanted: null, countedOut: false })).toBe(
      undefined,
    )
  })

  it('[P5] a line of a request that has not come waits for it; a used id is told', async () => {
    const { one, of, lineId } = await asked()
    const nowhere = { jobId: of.jobId, requestId: newId() }
    const waits = opsOf(one.device).addLine(nowhere, lineOf())
    const twice = opsOf(one.device).addLine(of, lineOf({ id: lineId }))
    expect((await sync(one.device, [waits, twice])).results).toMatchObject([
      { result: 'blocked', on: nowhere.requestId },
      { code: 'id_reuse' },
    ])
  })
})

describe('rows taken back', () => {
  it('[M8] a request nobody worked on is gone everywhere, and sent again it stays gone', async () => {
    const { one, two, of } = await asked()
    const drop = opsOf(one.device).dropRequest(of)
    expect((await sync(one.device, [drop])).results).toEqual([])
    expect(await requestNow(of)).toBeUndefined()
    const rows = await pullAll(two.device, two.cookie)
    expect(rows.filter((row) => row.id === of.requestId)).toMatchObject([{ state: 'deleted' }])
    expect((await sync(one.device, [drop])).results).toMatchObject([{ result: 'duplicate' }])
  })

  it('[M8] [fault 17] against a later edit the edit wins in both orders, marked, the taking back kept', async () => {
    for (const order of ['edit first', 'taking back first']) {
      const { one, two, of, lineId, base } = await asked()
      const drop = opsOf(one.device).dropRequest(of, base)
      const edit = opsOf(two.device).countLine(of, lineId, 3)
      const sends = [() => sync(two.device, [edit]), () => sync(one.device, [drop])]
      for (const send of order === 'edit first' ? sends : sends.toReversed()) await send()
      expect(await requestNow(of), order).toMatchObject({ revived: true, lines: [{ quantity: 5 }] })
      const kept = await inA((tx) => listFieldWrites(tx, [of.requestId]))
      expect(kept.find(({ field }) => field === 'row')?.write, order).toMatchObject({
        id: drop.id,
        state: 'lost',
      })
      const rows = await pullAll(one.device, one.cookie)
      const last = rows.findLast((row) => row.id === of.requestId)
      expect(last, order).toMatchObject({ state: 'present' })
    }
  })

  it('[M8] [M7] a request the desk works on is not taken back: the present state is told', async () => {
    const { one, of, lineId } = await asked()
    await deskMoves(of, lineId, 'identified')
    const answer = await sync(one.device, [opsOf(one.device).dropRequest(of)])
    expect(answer.results).toMatchObject([{ code: 'stale_status', detail: 'identified' }])
  })

  it('[M8] a stranger’s machine without a job goes; one with another’s job stays, marked', async () => {
    const one = await phoneOf(world.a, 'mechanic')
    const two = await phoneOf(world.a, 'second')
    const [free, used] = [machineAdd(), machineAdd()]
    await sync(one.device, [one.device.op(free), one.device.op(used)])
    await sync(two.device, [two.device.op(jobOpen(used.fields.id))])
    const answer = await sync(one.device, [
      opsOf(one.device).dropMachine(free.fields.id),
      opsOf(one.device).dropMachine(used.fields.id),
    ])
    expect(answer.results).toMatchObject([{ result: 'merged', loser: { value: 'takenBack' } }])
    const left = await inA((tx) => machinesById(tx, [free.fields.id, used.fields.id]))
    expect(left).toMatchObject([{ id: used.fields.id, revived: true }])
  })

  it('[M8] [fault 17] a job opened on a machine that was taken back brings it back', async () => {
    const one = await phoneOf(world.a, 'mechanic')
    const two = await phoneOf(world.a, 'second')
    const machine = machineAdd()
    const id = machine.fields.id
    await sync(one.device, [one.device.op(machine), opsOf(one.device).dropMachine(id)])
    expect(await inA((tx) => machinesById(tx, [id]))).toEqual([])
    const opening = jobOpen(id)
    const entry = two.device.op(logAdd(two.device, opening.fields.id, note('under the bridge')))
    const answer = await sync(two.device, [two.device.op(opening), entry])
    expect(answer.results).toEqual([])
    expect(await inA((tx) => machinesById(tx, [id]))).toMatchObject([{ revived: true }])
  })

  it('[M8] a machine of the fleet is not taken back from a phone, nor one with one’s own job', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const machine = machineAdd()
    const answer = await sync(device, [
      opsOf(device).dropMachine(world.a.machineId),
      device.op(machine),
      device.op(jobOpen(machine.fields.id)),
      opsOf(device).dropMachine(machine.fields.id),
    ])
    expect(answer.results).toMatchObject([
      { code: 'forbidden' },
      { code: 'stale_status', detail: 'inUse' },
    ])
  })
})
