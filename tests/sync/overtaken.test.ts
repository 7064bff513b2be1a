import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { changesAfter } from '@/db/queries/change-log'
import { isTouchedSince, lastChange, lockShop, takeChanges } from '@/db/queries/changes'
import { findJob, setJobStand } from '@/db/queries/jobs'
import { appendLogEntries, verifyLog } from '@/db/queries/log-entries'
import type { Op } from '@/lib/sync/protocol/op'
import { jobOpen, logAdd, machineAdd, note } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { AT } from '../support/shop-fixture'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)

async function openJob(device: RawDevice): Promise<string> {
  const machine = machineAdd()
  const job = jobOpen(machine.fields.id)
  await sync(device, [device.op(machine), device.op(job)])
  return job.fields.id
}

const notes = (device: RawDevice, jobId: string, count: number): Op[] =>
  Array.from({ length: count }, (_, n) => device.op(logAdd(device, jobId, note(`Look ${n}`))))

describe('[P7] evidence planned before the lock', () => {
  it('[R23] follows on in one chain when six phones write into one job and their own at once', async () => {
    const phones = await Promise.all(
      Array.from({ length: 6 }, async (_, n) => {
        const { device } = await phoneOf(world.a, n % 2 === 0 ? 'mechanic' : 'second')
        return { device, own: await openJob(device) }
      }),
    )
    const shared = phones[0]!.own
    for (let round = 0; round < 4; round += 1) {
      const answers = await Promise.all(
        phones.map(({ device, own }) =>
          sync(device, [...notes(device, shared, 3), ...notes(device, own, 3)]),
        ),
      )
      expect(answers.flatMap((answer) => answer.results)).toEqual([])
    }
    const own = await Promise.all(
      phones.slice(1).map((phone) => inA((tx) => verifyLog(tx, phone.own))),
    )
    expect(own).toEqual(own.map(() => ({ ok: true, value: 12 })))
    const both = 6 * 12 + 12
    expect(await inA((tx) => verifyLog(tx, shared))).toEqual({ ok: true, value: both })
    const numbers = await inA((tx) => changesAfter(tx, { seq: 0, limit: 10_000 }))
    expect(numbers.map(({ seq }) => seq)).toEqual(numbers.map((_, n) => n + 1))
  })

  it('[R13] brings a job back that was closed between planning and locking', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const jobId = await openJob(device)
    // Whoever closes holds the counter while the push reads, plans and waits.
    const stand = {
      state: 'closed',
      peopleState: 'withMachine',
      machineState: 'stranded',
      wayOut: null,
    } as const
    let pushing: Promise<unknown> = Promise.resolve()
    await inA(async (tx) => {
      await setJobStand(tx, { id: jobId, stand, by: { deviceId: null, at: AT } })
      await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
      pushing = sync(device, notes(device, jobId, 2))
      await new Promise((done) => setTimeout(done, 700))
    })
    await pushing
    expect((await inA((tx) => findJob(tx, jobId)))?.state).toBe('open')
    expect(await inA((tx) => verifyLog(tx, jobId))).toEqual({ ok: true, value: 2 })
  })

  it('[P7] gives way to a writer who holds the counter and comes for the same job’s log', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const jobId = await openJob(device)
    const [own, desk] = [notes(device, jobId, 3), notes(device, jobId, 1)]
    let pushing: Promise<{ results: unknown[] }> | null = null
    await inA(async (tx) => {
      // Out of order: the counter without the job's lock. The push has its rows written by now, and waits.
      await lockShop(tx)
      pushing = sync(device, own)
      await new Promise((done) => setTimeout(done, 300))
      const [entry] = desk.flatMap((op) => (op.kind === 'log.add' ? [op.fields] : []))
      await appendLogEntries(tx, { entries: [entry!], receivedAt: AT })
      await takeChanges(tx, [{ entity: 'logEntry', id: entry!.id, jobId }])
    })
    expect((await pushing!).results).toEqual([])
    expect(await inA((tx) => verifyLog(tx, jobId))).toEqual({ ok: true, value: 4 })
  })

  it('[P7] rests on its jobs, its entries, its writer and the code book, and on nothing else', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const [jobId, other] = [await openJob(device), await openJob(device)]
    const seq = await inA(lastChange)
    const [entry] = notes(device, jobId, 1) as [Op]
    await sync(device, [entry])
    const isTouched = (jobIds: string[], entityIds: string[], after = seq) =>
      inA((tx) => isTouchedSince(tx, { seq: after, jobIds, entityIds }))
    expect(await isTouched([jobId], [])).toBe(true)
    expect(await isTouched([], [entry.entityId])).toBe(true)
    expect(await isTouched([other], [other])).toBe(false)
    expect(await isTouched([jobId], [entry.entityId], seq + 1)).toBe(false)
    await inA((tx) => takeChanges(tx, [{ entity: 'book', id: '7', jobId: null }]))
    expect(await isTouched([other], [other])).toBe(true)
  })
})
