// Single values, through the real handlers (M1 to M5): what stands, what is shown besides, who may.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit, verifyAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { listFieldWrites } from '@/db/queries/field-history'
import { assignJob, findJob } from '@/db/queries/jobs'
import { machinesById } from '@/db/queries/machines'
import type { Job } from '@/lib/model/job'
import { hlcAt } from '@/lib/sync/protocol/hlc'
import { jobOpen, machineAdd } from '../support/field-ops'
import { opsOf, placeAt } from '../support/field-sets'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'

let world: SyncWorld
beforeAll(async () => {
  world = await openSyncWorld()
})
afterAll(() => world.close())

type Phone = Awaited<ReturnType<typeof phoneOf>>
const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
const jobNow = async (id: string) => (await inA((tx) => findJob(tx, id))) as Job

/** An open job that both phones hold, and the number of its row. */
async function sharedJob(): Promise<{ one: Phone; two: Phone; jobId: string; base: number }> {
  const one = await phoneOf(world.a, 'mechanic')
  const two = await phoneOf(world.a, 'second')
  const opening = jobOpen(world.a.machineId, { place: placeAt(47.06), weather: 'clear' })
  await sync(one.device, [one.device.op(opening)])
  const rows = await pullAll(two.device, two.cookie)
  const jobId = opening.fields.id
  return { one, two, jobId, base: rows.find((row) => row.id === jobId)?.seq ?? 0 }
}

describe('job.set', () => {
  it('[M1] writes the value into the row, keeps what was there, and tells the phones', async () => {
    const { one, two, jobId, base } = await sharedJob()
    const place = placeAt(47.1, 'By the gate')
    const op = opsOf(one.device).setJob(jobId, { field: 'place', value: place }, base)
    expect(await sync(one.device, [op])).toMatchObject({ taken: [op.id], results: [] })
    expect((await jobNow(jobId)).place).toEqual(place)
    const rows = await pullAll(two.device, two.cookie)
    expect(rows.find((row) => row.id === jobId)?.row).toMatchObject({ place })
    const kept = await inA((tx) => listFieldWrites(tx, [jobId]))
    expect(kept.map(({ write }) => [write.state, write.value])).toEqual([
      ['replaced', placeAt(47.06)],
      ['current', place],
    ])
  })

  it('[M2] [fault 15] of two written apart the later stands in any order, the other is shown', async () => {
    for (const order of ['as written', 'the other way round'] as const) {
      const { one, two, jobId, base } = await sharedJob()
      const first = opsOf(one.device).setJob(jobId, { field: 'weather', value: 'fog' }, base)
      const second = opsOf(two.device).setJob(jobId, { field: 'weather', value: 'snow' }, base)
      const later = { ...second, hlc: hlcAt(Date.now() + 5_000) }
      const sends = [() => sync(one.device, [first]), () => sync(two.device, [later])]
      const answers = []
      for (const send of order === 'as written' ? sends : sends.toReversed()) {
        answers.push(await send())
      }
      expect(answers[0]?.results).toEqual([])
      expect(answers[1]?.results).toMatchObject([
        { result: 'merged', loser: { field: 'weather', value: 'fog' } },
      ])
      expect(await jobNow(jobId)).toMatchObject({
        weather: 'snow',
        alsoEntered: [
          { id: first.id, field: 'weather', value: 'fog', by: world.a.people.mechanic?.id },
        ],
      })
      const rows = await pullAll(one.device, one.cookie)
      expect(rows.find((row) => row.id === jobId)?.row).toMatchObject({
        alsoEntered: [{ value: 'fog' }],
      })
    }
  })

  it('[P4] [M2] sent again it gets the same answer and changes nothing', async () => {
    const { one, two, jobId, base } = await sharedJob()
    await sync(one.device, [
      opsOf(one.device).setJob(jobId, { field: 'airTempC', value: -12 }, base),
    ])
    const op = opsOf(two.device).setJob(jobId, { field: 'airTempC', value: -9 }, base)
    const said = await sync(two.device, [op])
    const before = await inA((tx) => listFieldWrites(tx, [jobId]))
    expect((await sync(two.device, [op])).results).toEqual(said.results)
    expect(await inA((tx) => listFieldWrites(tx, [jobId]))).toEqual(before)
  })

  it('[M4] looked at, it is shown no longer; used, it is a new value', async () => {
    const { one, two, jobId, base } = await sharedJob()
    const first = opsOf(one.device).setJob(jobId, { field: 'place', value: placeAt(47.1) }, base)
    await sync(one.device, [first])
    await sync(two.device, [
      opsOf(two.device).setJob(jobId, { field: 'place', value: placeAt(47.2) }, base),
    ])
    const seen = await jobNow(jobId)
    expect(seen.alsoEntered).toHaveLength(1)
    const lostId = seen.alsoEntered?.[0]?.id ?? ''
    const rows = await pullAll(one.device, one.cookie)
    const now = rows.find((row) => row.id === jobId)?.seq ?? 0
    // A newer place by one who knew of both does not hide it.
    await sync(one.device, [
      opsOf(one.device).setJob(jobId, { field: 'complaintWords', value: 'Does not crank' }, now),
    ])
    expect((await jobNow(jobId)).alsoEntered).toHaveLength(1)
    await sync(two.device, [
      opsOf(two.device).setJob(jobId, { field: 'place', value: placeAt(47.1) }, now),
      opsOf(two.device).settle(jobId, [lostId]),
    ])
    const settled = await jobNow(jobId)
    expect(settled.alsoEntered).toBeUndefined()
    expect(settled).toMatchObject({
      place: { latitude: 47.1 },
      complaint: { words: 'Does not crank' },
    })
  })

  it('[M5] [fault 14] a clock three days ahead is taken and marked, and loses to a later edit', async () => {
    const { one, two, jobId, base } = await sharedJob()
    const ahead = {
      ...opsOf(one.device).setJob(jobId, { field: 'weather', value: 'fog' }, base),
      hlc: hlcAt(Date.now() + 3 * 24 * 3_600_000),
    }
    await sync(one.device, [ahead])
    const later = {
      ...opsOf(two.device).setJob(jobId, { field: 'weather', value: 'hail' }, base),
      hlc: hlcAt(Date.now() + 60_500),
    }
    // The shop's clock has gone on by a minute when the other phone writes.
    await new Promise((resolve) => setTimeout(resolve, 600))
    await sync(two.device, [later])
    const now = await jobNow(jobId)
    expect(now.weather).toBe('hail')
    expect(now.alsoEntered).toMatchObject([{ value: 'fog', clockOdd: true }])
    const [kept] = (await inA((tx) => listFieldWrites(tx, [jobId]))).filter(
      ({ write }) => write.id === ahead.id,
    )
    expect(kept?.write.claimedHlc).toBe(ahead.hlc)
  })

  it('[R23] leaves field and id in the audit trail, and nothing of what was written', async () => {
    const { one, jobId, base } = await sharedJob()
    const words = 'Dies after two seconds'
    const op = opsOf(one.device).setJob(jobId, { field: 'complaintWords', value: words }, base)
    await sync(one.device, [op])
    const audit = await inA((tx) => listAudit(tx, jobId))
    expect(audit).toMatchObject([{ action: 'job.set', detail: { field: 'complaintWords' } }])
    expect(JSON.stringify(audit)).not.toContain(words)
    expect(await inA((tx) => verifyAudit(tx, jobId))).toMatchObject({ ok: true })
  })

  it('[P11] is refused to those whose job it is not, and the job is unknown to another shop', async () => {
    const { one, jobId } = await sharedJob()
    const guide = await phoneOf(world.a, 'guide')
    await inA(async (tx) => {
      await assignJob(tx, { jobId, personId: world.a.people.second?.id ?? '' })
      await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
    })
    const stranger = await phoneOf(world.b, 'mechanic')
    const set = (phone: Phone) =>
      sync(phone.device, [opsOf(phone.device).setJob(jobId, { field: 'weather', value: 'x' })])
    expect((await set(guide)).results).toMatchObject([{ code: 'forbidden' }])
    expect((await set(stranger)).results).toMatchObject([{ result: 'blocked', on: jobId }])
    expect((await set(one)).results).toEqual([])
  })

  it('[P5] is refused with the field when the value is not of its kind', async () => {
    const { one, jobId } = await sharedJob()
    const bad = { field: 'airTempC', value: 'cold' } as never
    const answer = await sync(one.device, [opsOf(one.device).setJob(jobId, bad)])
    expect(answer.results).toMatchObject([{ code: 'invalid', field: 'fields.value' }])
  })

  it('[M1] in the batch that opens the job, it comes after the opening', async () => {
    const { device } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    const jobId = opening.fields.id
    await sync(device, [
      device.op(opening),
      opsOf(device).setJob(jobId, { field: 'weather', value: 'sleet' }),
      opsOf(device).setJob(jobId, { field: 'weather', value: 'hail' }),
    ])
    const now = await jobNow(jobId)
    expect(now.weather).toBe('hail')
    expect(now.alsoEntered).toBeUndefined()
  })
})

describe('machine.set', () => {
  it('[M1] keeps hours of two phones alike, the later standing, and shows the other', async () => {
    const one = await phoneOf(world.a, 'mechanic')
    const two = await phoneOf(world.a, 'second')
    const machine = machineAdd()
    const id = machine.fields.id
    await sync(one.device, [one.device.op(machine)])
    const rows = await pullAll(two.device, two.cookie)
    const base = rows.find((row) => row.id === id)?.seq ?? 0
    await sync(one.device, [opsOf(one.device).setMachine(id, { field: 'hours', value: 420 }, base)])
    await sync(two.device, [opsOf(two.device).setMachine(id, { field: 'hours', value: 421 }, base)])
    const [now] = await inA((tx) => machinesById(tx, [id]))
    expect(now).toMatchObject({ hours: 421, alsoEntered: [{ field: 'hours', value: 420 }] })
  })

  it('[P11] is refused to a guide', async () => {
    const { device } = await phoneOf(world.a, 'guide')
    const op = opsOf(device).setMachine(world.a.machineId, { field: 'year', value: 2020 })
    expect((await sync(device, [op])).results).toMatchObject([{ code: 'forbidden' }])
  })
})
