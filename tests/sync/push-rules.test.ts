import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAdvice } from '@/db/queries/advice'
import { listAudit, verifyAudit } from '@/db/queries/audit'
import { deviceGaps, findDevice } from '@/db/queries/devices'
import { findJob } from '@/db/queries/jobs'
import { listLog } from '@/db/queries/log-entries'
import { listPartRequests } from '@/db/queries/part-requests'
import { adviceKeep, jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'
import type { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
let device: RawDevice
beforeAll(async () => {
  world = await openSyncWorld()
  const phone = await phoneOf(world.a, 'mechanic')
  device = phone.device
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)
/** A new job of this phone, at the shop. */
async function openJob(from: RawDevice = device): Promise<string> {
  const opening = jobOpen(world.a.machineId)
  await sync(from, [from.op(opening)])
  return opening.fields.id
}
const codesOf = (answer: Awaited<ReturnType<typeof sync>>) =>
  answer.results.map((result) => ('code' in result ? result.code : result.result))

describe('POST /api/sync, rules of the shop', () => {
  it('[fault 16] [P2] accepts one of two devices that move one state, and tells the other where it stands', async () => {
    const other = (await phoneOf(world.a, 'second')).device
    const job = await openJob()
    const move = (from: RawDevice) =>
      from.op({
        kind: 'job.move',
        entityId: job,
        jobId: job,
        fields: { from: 'open', to: 'underWay', reason: null },
      })
    const answers = await Promise.all([sync(device, [move(device)]), sync(other, [move(other)])])
    const codes = answers.flatMap(codesOf)
    expect(codes).toEqual(['stale_status'])
    expect(answers.flatMap((answer) => answer.results)).toMatchObject([{ detail: 'underWay' }])
    expect(await inA((tx) => findJob(tx, job))).toMatchObject({ state: 'underWay' })
    const audit = (await inA((tx) => listAudit(tx, job))).filter(
      (entry) => entry.action === 'job.move',
    )
    expect(audit.map((entry) => entry.detail)).toEqual([{ from: 'open', to: 'underWay' }])
  })

  it('[R8] the way out on the job follows the log, whichever push takes it back', async () => {
    const job = await openJob()
    const decided = (wayOut: 'tow' | 'limpOut') =>
      logAdd(device, job, {
        kind: 'wayOut',
        wayOut,
        reasons: 'Dark soon',
        machineState: wayOut === 'tow' ? 'onTow' : 'limping',
        peopleState: 'onTheWay',
      })
    const [tow, limp] = [decided('tow'), decided('limpOut')]
    const correct = (id: string) =>
      device.op(logAdd(device, job, { kind: 'correction', reason: 'Wrong' }, { supersedes: id }))
    const wayOutAfter = async (op: unknown) => {
      expect(codesOf(await sync(device, [op]))).toEqual([])
      return (await inA((tx) => findJob(tx, job)))?.wayOut
    }
    expect(await wayOutAfter(device.op(tow))).toBe('tow')
    expect(await wayOutAfter(device.op(limp))).toBe('limpOut')
    expect(await wayOutAfter(correct(limp.fields.id))).toBe('tow')
    expect(await wayOutAfter(correct(tow.fields.id))).toBeNull()
  })

  it('[R8] a guide’s correction of a mechanic’s fix is refused, its author’s is not', async () => {
    const guide = (await phoneOf(world.a, 'guide')).device
    const job = await openJob()
    const fix = logAdd(device, job, {
      kind: 'fix',
      fault: 'ignitionCoilPart',
      words: 'Coil swapped',
      temporary: null,
    })
    await sync(device, [device.op(fix)])
    const correct = (from: RawDevice) =>
      from.op(
        logAdd(from, job, { kind: 'correction', reason: 'Wrong' }, { supersedes: fix.fields.id }),
      )
    expect(codesOf(await sync(guide, [correct(guide)]))).toEqual(['forbidden'])
    expect(codesOf(await sync(device, [correct(device)]))).toEqual([])
  })

  it('[R13] reopens a job closed by another phone when the field writes on, whole in the log', async () => {
    const other = (await phoneOf(world.a, 'owner')).device
    const job = await openJob()
    await sync(device, [device.op(logAdd(device, job, note('first')))])
    await sync(other, [
      other.op({
        kind: 'job.move',
        entityId: job,
        jobId: job,
        fields: { from: 'open', to: 'closed', reason: null },
      }),
    ])
    expect(await inA((tx) => findJob(tx, job))).toMatchObject({ state: 'closed' })
    await sync(device, [device.op(logAdd(device, job, note('late')))])
    expect(await inA((tx) => findJob(tx, job))).toMatchObject({ state: 'open' })
    const steps = (await inA((tx) => listAudit(tx, job))).map((entry) => entry.detail)
    expect(steps).toEqual([
      { from: 'open', to: 'closed' },
      { from: 'closed', to: 'open' },
    ])
    expect(await inA((tx) => verifyAudit(tx, job))).toMatchObject({ ok: true })
  })

  it('[R13] leaves a job closed that its own phone closed before it wrote the last words', async () => {
    const job = await openJob()
    await sync(device, [
      device.op({
        kind: 'job.move',
        entityId: job,
        jobId: job,
        fields: { from: 'open', to: 'closed', reason: null },
      }),
    ])
    await sync(device, [device.op(logAdd(device, job, note('key is in the box')))])
    expect(await inA((tx) => findJob(tx, job))).toMatchObject({ state: 'closed' })
    expect(await inA((tx) => listLog(tx, job))).toHaveLength(1)
  })

  it('[R23] keeps advice with the engine’s input and answer unchanged', async () => {
    const job = await openJob()
    const inputs = { b: 1, a: [0.1, 0.2, null], z: { deep: 'ä' } }
    const kept = adviceKeep(job, inputs)
    await sync(device, [device.op(kept)])
    const [stored] = await inA((tx) => listAdvice(tx, job))
    expect(JSON.stringify(stored?.inputs)).toBe(JSON.stringify(inputs))
    expect(stored).toEqual(kept.fields)
  })

  it('[PR1] stores a request once when its push is sent twice, its lines as asked', async () => {
    const job = await openJob()
    const op = device.op(partRequestAsk(job))
    await Promise.all([sync(device, [op]), sync(device, [op])])
    const requests = await inA((tx) => listPartRequests(tx, { jobId: job }))
    expect(requests).toMatchObject([
      { askedBy: device.owner.personId, lines: [{ state: 'asked', quantity: 1 }] },
    ])
  })

  it('[P22] records how far a phone has come and which numbers are missing', async () => {
    const { device: gappy } = await phoneOf(world.a, 'mechanic')
    const job = await openJob(gappy)
    const ops = Array.from({ length: 9 }, (_, i) => gappy.op(logAdd(gappy, job, note(`g${i}`))))
    await sync(gappy, [ops[0], ops[1], ops[4], ops[8]])
    expect(await inA((tx) => deviceGaps(tx, gappy.id))).toEqual([
      { first: 4, last: 5 },
      { first: 7, last: 9 },
    ])
    expect(await inA((tx) => findDevice(tx, gappy.id))).toMatchObject({ highestDseq: 10 })
    await sync(gappy, ops)
    expect(await inA((tx) => deviceGaps(tx, gappy.id))).toEqual([])
  })

  it('[R13] stores what a phone’s clock is off and never refuses for it', async () => {
    const { device: fast, cookie: its } = await phoneOf(world.a, 'mechanic')
    fast.skewMs = 3 * 24 * 3600 * 1000
    const job = await openJob(fast)
    const answer = await sync(fast, [fast.op(logAdd(fast, job, note('from the future')))], {
      cookie: its,
    })
    expect(answer.results).toEqual([])
    expect(Math.abs(Date.parse(answer.serverTime) - Date.now())).toBeLessThan(60_000)
    const stored = await inA((tx) => findDevice(tx, fast.id))
    expect(Math.abs((stored?.clockOffsetMs ?? 0) - fast.skewMs)).toBeLessThan(60_000)
    const odd = await sync(fast, [], { clientTime: 'half past nine' })
    expect(odd.pull.kind).toBe('notAsked')
    expect((await inA((tx) => findDevice(tx, fast.id)))?.clockOffsetMs).toBe(stored?.clockOffsetMs)
  })

  it('[P4] refuses another record under a used id', async () => {
    const job = await openJob()
    const entry = logAdd(device, job, note('mine'))
    await sync(device, [device.op(entry)])
    const forged = { ...entry, fields: { ...entry.fields, body: note('changed') } }
    expect(codesOf(await sync(device, [device.op(forged)]))).toEqual(['id_reuse'])
    expect((await inA((tx) => listLog(tx, job))).map((row) => row.body)).toEqual([note('mine')])
  })

  it('[R23] leaves every chain of the shop whole and its numbers dense after all of this', async () => {
    expect(await expectWholeShop(world.a.id)).toBeGreaterThan(6)
  })
})
