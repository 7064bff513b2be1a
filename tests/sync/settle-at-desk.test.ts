// The desk looks at values that did not stand (M4).
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { listAudit } from '@/db/queries/audit'
import { takeChanges } from '@/db/queries/changes'
import { assignJob, findJob } from '@/db/queries/jobs'
import type { Actor } from '@/lib/model/person'
import { hlcAt } from '@/lib/sync/protocol/hlc'
import { settleAtDesk } from '@/lib/sync/server/settle-at-desk'
import { jobOpen } from '../support/field-ops'
import { opsOf, placeAt } from '../support/field-sets'
import { newId } from '../support/shop-fixture'
import { openSyncWorld, phoneOf, pullAll, type SyncWorld, sync } from '../support/sync-world'
import { expectWholeShop } from '../support/whole-shop'

let world: SyncWorld
let actor: Actor
beforeAll(async () => {
  world = await openSyncWorld()
  const personId = world.a.people.dispatcher?.id ?? ''
  actor = { shopId: world.a.id, personId, roles: ['dispatcher'], name: null }
})
afterAll(() => world.close())

const jobNow = (id: string) => asShop(world.a.id, (tx) => findJob(tx, id))
const stamp = () => ({ newId, at: new Date().toISOString() })

/** A job whose place two phones entered apart: 47.2 stands, 47.1 waits. */
async function apart() {
  const one = await phoneOf(world.a, 'mechanic')
  const two = await phoneOf(world.a, 'second')
  const opening = jobOpen(world.a.machineId)
  const jobId = opening.fields.id
  await sync(one.device, [one.device.op(opening)])
  const rows = await pullAll(two.device, two.cookie)
  const base = rows.find((row) => row.id === jobId)?.seq ?? 0
  const first = {
    ...opsOf(one.device).setJob(jobId, { field: 'place', value: placeAt(47.1) }, base),
    hlc: hlcAt(Date.now() - 60_000),
  }
  const second = opsOf(two.device).setJob(jobId, { field: 'place', value: placeAt(47.2) }, base)
  await sync(one.device, [first])
  await sync(two.device, [second])
  return { one, two, jobId, historyId: first.id, base }
}

describe('at the desk', () => {
  it('[M4] used, it stands, the phones hear of it, and the audit says who', async () => {
    const { two, jobId, historyId } = await apart()
    expect(await settleAtDesk(actor, { jobId, historyId, use: true, stamp: stamp() })).toEqual({
      ok: true,
      value: null,
    })
    const job = await jobNow(jobId)
    expect(job?.place?.latitude).toBe(47.1)
    expect(job).not.toHaveProperty('alsoEntered')
    const rows = await pullAll(two.device, two.cookie)
    expect(rows.findLast((row) => row.id === jobId)?.row).toMatchObject({
      place: { latitude: 47.1 },
    })
    const audit = await asShop(world.a.id, (tx) => listAudit(tx, jobId))
    expect(audit.at(-1)).toMatchObject({ action: 'job.settle', actorId: actor.personId })
    await expectWholeShop(world.a.id)
  })

  it('[M4] left, the standing one stays, and it is shown no longer; a second press finds nothing', async () => {
    const { jobId, historyId } = await apart()
    await settleAtDesk(actor, { jobId, historyId, use: false, stamp: stamp() })
    const job = await jobNow(jobId)
    expect(job?.place?.latitude).toBe(47.2)
    expect(job).not.toHaveProperty('alsoEntered')
    expect(await settleAtDesk(actor, { jobId, historyId, use: true, stamp: stamp() })).toEqual({
      ok: false,
      problem: { kind: 'notFound' },
    })
  })

  it('[M2] what a phone wrote without knowing of the desk’s word is merged like any other', async () => {
    const { one, jobId, historyId, base } = await apart()
    await settleAtDesk(actor, { jobId, historyId, use: true, stamp: stamp() })
    const late = opsOf(one.device).setJob(jobId, { field: 'place', value: placeAt(47.3) }, base)
    await sync(one.device, [late])
    expect(await jobNow(jobId)).toMatchObject({
      place: { latitude: 47.3 },
      alsoEntered: [{ by: actor.personId, value: { latitude: 47.1 } }],
    })
  })

  it('[R22] finds nothing of another shop', async () => {
    const { jobId, historyId } = await apart()
    const stranger = { ...actor, shopId: world.b.id, personId: world.b.people.owner?.id ?? '' }
    const answer = await settleAtDesk(stranger, { jobId, historyId, use: true, stamp: stamp() })
    expect(answer).toMatchObject({ ok: false })
  })

  it('[R22] a mechanic settles no value of a job in somebody else’s hands', async () => {
    const { jobId, historyId } = await apart()
    const mechanic = (who: string): Actor => {
      const personId = world.a.people[who]?.id ?? ''
      return { ...actor, personId, roles: ['mechanic'] }
    }
    await asShop(world.a.id, async (tx) => {
      await assignJob(tx, { jobId, personId: mechanic('mechanic').personId })
      await takeChanges(tx, [{ entity: 'job', id: jobId, jobId, whole: true }])
    })
    const input = { jobId, historyId, use: true }
    expect(await settleAtDesk(mechanic('second'), { ...input, stamp: stamp() })).toEqual({
      ok: false,
      problem: { kind: 'notFound' },
    })
    expect(await jobNow(jobId)).toMatchObject({
      place: { latitude: 47.2 },
      alsoEntered: [{ id: historyId }],
    })
    expect(await settleAtDesk(mechanic('mechanic'), { ...input, stamp: stamp() })).toMatchObject({
      ok: true,
    })
    expect((await jobNow(jobId))?.place?.latitude).toBe(47.1)
  })
})
