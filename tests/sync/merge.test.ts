// One stranding reported twice (R13, M9 to M11): merged, written to under the old id, and undone.
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { POST as postMachineMerge } from '@/app/api/desk/machines/[id]/merge/route'
import { POST as postMachineUnmerge } from '@/app/api/desk/machines/[id]/unmerge/route'
import { asShop } from '@/db/client'
import { listAudit, verifyAudit } from '@/db/queries/audit'
import { changesAfter } from '@/db/queries/change-log'
import { lastChange, takeChanges } from '@/db/queries/changes'
import { assignJob, findJob } from '@/db/queries/jobs'
import { verifyLog } from '@/db/queries/log-entries'
import { machinesById } from '@/db/queries/machines'
import { jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { opsOf, placeAt } from '../support/field-sets'
import { openMergeDesk, wordsOf } from '../support/merge-desk'
import {
  openSyncWorld,
  phoneOf,
  pullAll,
  type SyncWorld,
  signIn,
  sync,
} from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
let desk: Awaited<ReturnType<typeof openMergeDesk>>
beforeAll(async () => {
  world = await openSyncWorld()
  desk = await openMergeDesk(world)
})
afterAll(() => world.close())

const inA = <T>(run: Parameters<typeof asShop<T>>[1]) => asShop(world.a.id, run)

describe('merging two jobs', () => {
  it('[M9] shows the one that goes on with the entries of both, their authors kept, chains whole', async () => {
    const { jobId, intoId } = await desk.twice()
    expect((await desk.merge(jobId, intoId)).status).toBe(200)
    for (const id of [intoId, jobId]) {
      const found = await desk.atDesk(id)
      expect(found.job).toMatchObject({ id: intoId, mergedFrom: [jobId] })
      expect(wordsOf(found)).toEqual(['bogged to the frame', 'call taken'])
      expect(found.entries.map((entry) => entry.authorId)).toEqual([
        desk.personOf('guide'),
        desk.personOf('second'),
      ])
      expect(found.merged).toMatchObject([{ id: jobId }])
    }
    const board = await desk.onBoard()
    expect(board.get(intoId)).toBe(2)
    expect(board.has(jobId)).toBe(false)
    for (const id of [jobId, intoId]) {
      expect(await inA((tx) => verifyLog(tx, id))).toEqual({ ok: true, value: 1 })
      expect(await inA((tx) => verifyAudit(tx, id))).toMatchObject({ ok: true })
    }
    expect((await inA((tx) => listAudit(tx, jobId))).at(-1)).toMatchObject({
      action: 'job.merge',
      actorId: desk.personOf('dispatcher'),
      detail: { into: intoId },
    })
    expect((await inA((tx) => listAudit(tx, intoId))).at(-1)).toMatchObject({
      detail: { from: jobId },
    })
    await expectWholeShop(world.a.id)
  })

  it('[M9] brings the phone of each the rows of both, under the one that goes on', async () => {
    const { guide, other, jobId, intoId } = await desk.twice()
    await desk.merge(jobId, intoId)
    for (const phone of [guide, other]) {
      const rows = await pullAll(phone.device, phone.cookie)
      const present = rows.filter((row) => row.state === 'present')
      expect(present.filter((row) => row.entity === 'logEntry').map((row) => row.jobId)).toEqual([
        intoId,
        intoId,
      ])
      const old = present.findLast((row) => row.id === jobId)
      expect(old?.row).toMatchObject({ mergedInto: intoId })
      expect(present.findLast((row) => row.id === intoId)?.row).toMatchObject({
        mergedFrom: [jobId],
        alsoOpenedBy: [desk.personOf('guide')],
      })
    }
    // Somebody else's: neither was in nobody's hands any more.
    const third = await phoneOf(world.a, 'mechanic')
    const rows = await pullAll(third.device, third.cookie)
    expect(rows.filter((row) => row.id === jobId || row.id === intoId)).toEqual([])
  })

  it('[M10] late entries to the old id land in the one that goes on, and go back with their job', async () => {
    const { guide, jobId, intoId } = await desk.twice()
    await desk.merge(jobId, intoId)
    const late = ['winch ready', 'strap round the birch', 'pulled out'].map((words) =>
      guide.device.op(logAdd(guide.device, jobId, note(words))),
    )
    const ask = guide.device.op(
      logAdd(guide.device, jobId, { kind: 'people', to: 'onTheWay', words: null }),
    )
    const seq = await inA(lastChange)
    expect((await sync(guide.device, [...late, ask])).results).toEqual([])
    const found = await desk.atDesk(intoId)
    expect(wordsOf(found)).toHaveLength(6)
    expect(new Set(found.entries.slice(2).map((entry) => entry.authorId))).toEqual(
      new Set([desk.personOf('guide')]),
    )
    const told = await inA((tx) => changesAfter(tx, { seq, limit: 100 }))
    expect(new Set(told.map((change) => change.jobId))).toEqual(new Set([intoId]))

    expect((await desk.unmerge(jobId)).status).toBe(200)
    expect(wordsOf(await desk.atDesk(jobId))).toHaveLength(5)
    expect(wordsOf(await desk.atDesk(intoId))).toEqual(['call taken'])
    expect((await desk.onBoard()).get(jobId)).toBe(5)
    const rows = await pullAll(guide.device, guide.cookie)
    const last = rows.findLast((row) => row.id === late[0]?.entityId)
    expect(last).toMatchObject({ state: 'present', jobId })
    expect(await inA((tx) => findJob(tx, jobId))).not.toHaveProperty('mergedInto')
    expect((await inA((tx) => listAudit(tx, jobId))).at(-1)).toMatchObject({
      action: 'job.unmerge',
    })
    await expectWholeShop(world.a.id)
  })

  it('[M10] a move under the old id moves the one that goes on, and a stale one is told', async () => {
    const { guide, other, jobId, intoId } = await desk.twice()
    await desk.merge(jobId, intoId)
    const move = (to: 'onTheWay' | 'safe') =>
      guide.device.op({
        kind: 'job.people',
        jobId,
        entityId: jobId,
        fields: { from: 'withMachine', to },
      })
    expect((await sync(guide.device, [move('onTheWay')])).results).toEqual([])
    expect((await desk.atDesk(intoId)).job.peopleState).toBe('onTheWay')
    expect((await sync(guide.device, [move('safe')])).results).toMatchObject([
      { code: 'stale_status', detail: 'onTheWay' },
    ])
    const place = placeAt(47.1004, 'North bank')
    const set = opsOf(guide.device).setJob(jobId, { field: 'place', value: place })
    expect((await sync(guide.device, [set])).results).toMatchObject([
      { result: 'merged', loser: { value: { latitude: 47.1 } } },
    ])
    expect((await desk.atDesk(jobId)).job).toMatchObject({
      place,
      alsoEntered: [{ field: 'place', value: { latitude: 47.1 } }],
    })
    const rows = await pullAll(other.device, other.cookie)
    expect(rows.findLast((row) => row.id === intoId)?.row).toMatchObject({ place })
  })

  it('[M10] a correction, parts and a closed job work across the two', async () => {
    const { guide, other, jobId, intoId } = await desk.twice()
    await desk.merge(jobId, intoId)
    const first = (await desk.atDesk(intoId)).entries[0]?.id ?? ''
    const struck = other.device.op(
      logAdd(
        other.device,
        intoId,
        { kind: 'correction', reason: 'Only to the axles' },
        {
          supersedes: first,
        },
      ),
    )
    const request = other.device.op(partRequestAsk(jobId))
    expect((await sync(other.device, [struck, request])).results).toEqual([])
    expect((await desk.atDesk(intoId)).parts.map((one) => one.id)).toEqual([request.entityId])
    const closing = other.device.op({
      kind: 'job.move',
      jobId: intoId,
      entityId: intoId,
      fields: { from: 'open', to: 'closed', reason: null },
    })
    expect((await sync(other.device, [closing])).results).toEqual([])
    expect((await desk.onBoard()).has(intoId)).toBe(false)
    // The field writes on, under the old id: the one that goes on is open again (R13).
    await sync(guide.device, [guide.device.op(logAdd(guide.device, jobId, note('still here')))])
    expect((await desk.onBoard()).has(intoId)).toBe(true)
  })

  it('[M11] who worked on the merged job works on the one that goes on, until it is undone', async () => {
    const { jobId, intoId } = await desk.twice()
    await inA(async (tx) => {
      await assignJob(tx, { jobId, personId: desk.personOf('mechanic') })
      await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
    })
    await desk.merge(jobId, intoId)
    expect((await desk.atDesk(intoId)).job.assignedTo).toEqual([
      desk.personOf('second'),
      desk.personOf('mechanic'),
    ])
    await desk.unmerge(jobId)
    expect((await desk.atDesk(intoId)).job.assignedTo).toEqual([desk.personOf('second')])
    expect((await desk.atDesk(jobId)).job.assignedTo).toEqual([desk.personOf('mechanic')])
  })

  it('[M11] a chain of merges leads to its end, and each link can be undone', async () => {
    const { jobId, intoId } = await desk.twice()
    const { jobId: lastId } = await desk.twice()
    await desk.merge(jobId, intoId)
    await desk.merge(intoId, lastId)
    expect((await desk.atDesk(jobId)).job.id).toBe(lastId)
    expect(wordsOf(await desk.atDesk(lastId))).toHaveLength(3)
    await desk.unmerge(intoId)
    expect((await desk.atDesk(jobId)).job.id).toBe(intoId)
    expect(wordsOf(await desk.atDesk(lastId))).toHaveLength(1)
    await desk.unmerge(jobId)
    expect((await desk.atDesk(jobId)).job.id).toBe(jobId)
    await expectWholeShop(world.a.id)
  })

  it('[M9] is refused: into itself, twice, a closed one, an unknown one, another shop’s, by a mechanic', async () => {
    const { jobId, intoId } = await desk.twice()
    const foreign = jobOpen(world.b.machineId)
    const stranger = await phoneOf(world.b, 'mechanic')
    await sync(stranger.device, [stranger.device.op(foreign)])
    expect((await desk.merge(jobId, jobId)).status).toBe(409)
    expect((await desk.unmerge(jobId)).status).toBe(409)
    expect((await desk.merge(jobId, foreign.fields.id)).status).toBe(404)
    expect((await desk.merge(foreign.fields.id, jobId)).status).toBe(404)
    expect((await desk.merge(jobId, 'x')).status).toBe(400)
    const mechanic = (await signIn(world.a, 'mechanic')).cookie
    expect((await desk.merge(jobId, intoId, mechanic)).status).toBe(403)
    expect((await desk.unmerge(jobId, mechanic)).status).toBe(403)
    expect((await desk.merge(jobId, intoId, '')).status).toBe(401)
    await desk.merge(jobId, intoId)
    expect((await desk.merge(jobId, intoId)).status).toBe(409)
    expect((await desk.merge(intoId, jobId)).status).toBe(409)
  })
})

describe('merging two machines', () => {
  it('[M9] a job of either shows the one that stands for both; undone, each its own', async () => {
    const phone = await phoneOf(world.a, 'mechanic')
    const machine = machineAdd()
    const id = machine.fields.id
    const job = jobOpen(id)
    await sync(phone.device, [phone.device.op(machine), phone.device.op(job)])
    const merged = await desk.asked(postMachineMerge, id, { into: world.a.machineId })
    expect(merged.status).toBe(200)
    expect((await desk.atDesk(job.fields.id)).machine?.id).toBe(world.a.machineId)
    const rows = await pullAll(phone.device, phone.cookie)
    expect(rows.findLast((row) => row.id === id)?.row).toMatchObject({
      mergedInto: world.a.machineId,
    })
    expect(
      (
        await sync(phone.device, [
          opsOf(phone.device).setMachine(id, { field: 'hours', value: 99 }),
        ])
      ).results,
    ).toEqual([])
    expect((await desk.atDesk(job.fields.id)).machine?.hours).toBe(99)
    expect((await desk.asked(postMachineUnmerge, id)).status).toBe(200)
    const [own] = await inA((tx) => machinesById(tx, [id]))
    expect(own).toMatchObject({ hours: 99 })
    expect(own).not.toHaveProperty('mergedInto')
    expect((await desk.atDesk(job.fields.id)).machine?.id).toBe(id)
  })
})
