// What is written at the shop between the phones: the server functions behind the desk's forms and tasks.
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { changeAssignment, changePartLine, type Stamp } from '@/db/queries/desk-writes'
import { listJobs } from '@/db/queries/jobs'
import { insertMachines, listBags, saveBag, saveMeter } from '@/db/queries/machines'
import { type MergeEntity, type MergeStamp, mergeRows, unmergeRow } from '@/db/queries/merges'
import { listPartRequests } from '@/db/queries/part-requests'
import { listQuarantine } from '@/db/queries/quarantine'
import type { Actor } from '@/lib/model/person'
import type { DecideForm } from '@/lib/model/phones'
import { shopFiles } from '@/lib/ports/files'
import { moveLine, stateAfterAssigning } from '@/lib/shop/desk-moves'
import { mayMerge } from '@/lib/shop/merge-rules'
import { decide } from '@/lib/sync/server/quarantine-form'
import { leaveField } from '@/lib/work/leave-field'
import { pruneChanges } from '@/lib/work/prune-changes'
import type { Draw } from './draw'
import { NO_MACHINE, type SimShop } from './shop-set'
import type { World } from './world'

/** One writer of the desk: reads first, so that a race can fall in between, and then writes. */
export type DeskWriter = {
  name: string
  weight: number
  write(world: World, shop: SimShop, draw: Draw): Promise<void>
}

const DAY_MS = 24 * 3_600_000

export const DESK_WRITERS: DeskWriter[] = [
  { name: 'assign', weight: 5, write: (world, shop, draw) => assign(world, shop, draw, true) },
  { name: 'unassign', weight: 3, write: (world, shop, draw) => assign(world, shop, draw, false) },
  { name: 'moveLine', weight: 4, write: movePartLine },
  { name: 'addMachine', weight: 3, write: addMachine },
  { name: 'packBag', weight: 1, write: packBag },
  { name: 'saveMeter', weight: 1, write: newMeter },
  { name: 'mergeJobs', weight: 2, write: (world, shop, draw) => merge(world, shop, draw, 'job') },
  {
    name: 'mergeMachines',
    weight: 1,
    write: (world, shop, draw) => merge(world, shop, draw, 'machine'),
  },
  { name: 'unmerge', weight: 1, write: unmerge },
  { name: 'decide', weight: 2, write: decideQuarantine },
  { name: 'prune', weight: 0.5, write: prune },
  {
    name: 'leaveField',
    weight: 1,
    write: (world, shop) =>
      leaveField({ shopId: shop.id }, { now: world.truth.now() + 61 * DAY_MS }),
  },
]

const stampOf = (world: World): Stamp => ({
  auditId: world.truth.id(4),
  at: new Date(world.truth.now()).toISOString(),
})
/** The owner, who may do everything at the desk. */
export const ownerOf = (shop: SimShop): Actor => ({
  shopId: shop.id,
  personId: shop.people.owner.id,
  roles: ['owner'],
  name: shop.people.owner.name,
})

async function jobsOf(shop: SimShop) {
  const jobs = await asShop(shop.id, (tx) => listJobs(tx))
  return jobs.sort((a, b) => (a.id < b.id ? -1 : 1))
}

async function assign(world: World, shop: SimShop, draw: Draw, assigned: boolean): Promise<void> {
  const job = draw.pick(await jobsOf(shop))
  if (job === undefined) return await addMachine(world, shop)
  const { mechanic, second, guide, both } = shop.people
  const person = draw.oneOf([mechanic, second, guide, both])
  const personId = assigned ? person.id : (draw.pick(job.assignedTo) ?? person.id)
  await changeAssignment(
    ownerOf(shop),
    { jobId: job.id, personId, assigned, stamp: stampOf(world) },
    (now, whom) => stateAfterAssigning(now, whom, assigned),
  )
}

async function movePartLine(world: World, shop: SimShop, draw: Draw): Promise<void> {
  const requests = await asShop(shop.id, (tx) => listPartRequests(tx))
  const request = draw.pick(requests.sort((a, b) => (a.id < b.id ? -1 : 1)))
  const line = request && draw.pick(request.lines)
  if (!request || !line) return await addMachine(world, shop)
  const from = line.state
  const to = draw.oneOf(['identified', 'quoted', 'cancelled'] as const)
  const price = { minor: draw.between(100, 9000), currency: 'USD' }
  const move =
    to === 'identified'
      ? { from, to, number: `N-${draw.below(1000)}` }
      : to === 'quoted'
        ? { from, to, number: null, price }
        : { from, to }
  const input = { requestId: request.id, lineId: line.id, stamp: stampOf(world) }
  await changePartLine(ownerOf(shop), input, (now) => moveLine(now, move))
}

/** A plain writer: one row and its number. */
async function addMachine(world: World, shop: SimShop): Promise<void> {
  const id = world.truth.id(5)
  await asShop(shop.id, async (tx) => {
    await insertMachines(tx, [{ ...NO_MACHINE, id, modelId: shop.modelId, fleet: true }])
    await takeChanges(tx, [{ entity: 'machine', id, jobId: null }])
  })
}

async function packBag(_world: World, shop: SimShop, draw: Draw): Promise<void> {
  await asShop(shop.id, async (tx) => {
    const [bag] = await listBags(tx)
    if (bag === undefined) return
    const parts = [{ part: 'sparkPlug', quantity: draw.below(9), knownGood: true }]
    await saveBag(tx, { ...bag, parts })
    await takeChanges(tx, [{ entity: 'bag', id: bag.id, jobId: null }])
  })
}

async function newMeter(world: World, shop: SimShop): Promise<void> {
  const id = world.truth.id(5)
  await asShop(shop.id, async (tx) => {
    await saveMeter(tx, {
      id,
      name: 'Another test meter',
      functions: {},
      leadsOhm: { low: 0.1, high: 0.2 },
      perKelvin: 0.1,
      source: 'invented for the simulator',
    })
    await takeChanges(tx, [{ entity: 'meterProfile', id, jobId: null }])
  })
}

async function idsOf(shop: SimShop, entity: MergeEntity, merged: boolean): Promise<string[]> {
  const rows = await asShop(shop.id, (tx) =>
    tx
      .selectFrom(entity)
      .select('id')
      .where('shopId', '=', shop.id)
      .where('mergedInto', merged ? 'is not' : 'is', null)
      .orderBy('id')
      .execute(),
  )
  return rows.map((row) => row.id)
}

const mergeStamp = (world: World): MergeStamp => ({
  newId: () => world.truth.id(4),
  at: new Date(world.truth.now()).toISOString(),
})

async function merge(world: World, shop: SimShop, draw: Draw, entity: MergeEntity): Promise<void> {
  const ids = await idsOf(shop, entity, false)
  const [id, intoId] = [draw.pick(ids), draw.pick(ids)]
  if (id === undefined || intoId === undefined) return await addMachine(world, shop)
  world.hasMerged ||= entity === 'job'
  await mergeRows(ownerOf(shop), { entity, id, intoId, stamp: mergeStamp(world) }, mayMerge)
}

async function unmerge(world: World, shop: SimShop, draw: Draw): Promise<void> {
  const entity = draw.oneOf(['job', 'machine'] as const)
  const id = draw.pick(await idsOf(shop, entity, true))
  if (id === undefined) return await addMachine(world, shop)
  const input = { entity, id, stamp: mergeStamp(world) }
  await unmergeRow(ownerOf(shop), input, { kind: 'notMerged' as const })
}

/** The owner's word on everything that waits of one phone. */
async function decideQuarantine(world: World, shop: SimShop, draw: Draw): Promise<void> {
  const items = await asShop(shop.id, (tx) => listQuarantine(tx))
  const phoneId = draw.pick(items.filter((item) => item.decision === null))?.deviceId
  if (phoneId === undefined) return await addMachine(world, shop)
  const form: DecideForm = draw.chance(0.7)
    ? { phoneId, opId: null, decision: 'accept' }
    : { phoneId, opId: null, decision: 'refuse', reason: 'Not ours' }
  const with_ = { files: shopFiles(), now: world.truth.now(), newId: () => world.truth.id(4) }
  await decide(ownerOf(shop), form, with_)
}

/** As if 180 days had passed: what was taken back is forgotten. */
async function prune(world: World, shop: SimShop): Promise<void> {
  world.hasPruned = true
  await pruneChanges({ shopId: shop.id }, { now: Date.UTC(2100, 0, 1) })
}
