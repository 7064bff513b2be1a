// What may happen at a step. One row per command; which, on which phone and how is drawn from the seed.
import { asShop } from '@/db/client'
import { takeChanges } from '@/db/queries/changes'
import { revokeMembership, setRoles } from '@/db/queries/people'
import type { Role } from '@/lib/model/role'
import { writeMeta } from '@/lib/sync/client/phone-db'
import { revokePhone } from '@/lib/sync/server/revoke'
import { restore, takeBackup } from './backup'
import { DESK_WRITERS, ownerOf } from './desk-writers'
import type { Handset } from './handset'
import { race, recordOn, syncOn } from './phone-commands'
import type { SimPerson, SimShop } from './shop-set'
import type { World } from './world'

export type Command = {
  name: string
  weight: number
  /** Answers what it did, for the list of steps. */
  run(world: World, handset: Handset): string | Promise<string>
}

const HOUR_MS = 3_600_000
const DAY_MS = 24 * HOUR_MS

export const COMMANDS: Command[] = [
  { name: 'record', weight: 30, run: (world, handset) => recordOn(world, handset) },
  { name: 'sync', weight: 26, run: syncOn },
  { name: 'race', weight: 14, run: race },
  { name: 'desk', weight: 8, run: atDesk },
  { name: 'signal', weight: 5, run: changeSignal },
  { name: 'time', weight: 5, run: passTime },
  { name: 'clock', weight: 3, run: changeClock },
  { name: 'room', weight: 3, run: changeRoom },
  { name: 'session', weight: 3, run: changeSession },
  { name: 'late', weight: 4, run: deliverLate },
  { name: 'version', weight: 3, run: changeVersion },
  { name: 'person', weight: 3, run: changePerson },
  { name: 'roles', weight: 2, run: changeRoles },
  { name: 'reopen', weight: 2, run: reopenApp },
  { name: 'locks', weight: 1, run: changeLocks },
  { name: 'cursor', weight: 1, run: forgeCursor },
  { name: 'backup', weight: 2, run: backUp },
  { name: 'restore', weight: 1, run: restoreBackup },
  { name: 'revoke', weight: 0.6, run: revoke },
]

/** Where only races count: for wrong programs that nothing but a race shows. */
const RACY: Record<string, number> = { race: 60, record: 15, sync: 15 }
export const RACY_COMMANDS: Command[] = COMMANDS.map((command) => ({
  ...command,
  weight: RACY[command.name] ?? 0,
}))

async function atDesk(world: World): Promise<string> {
  const shop = world.draw.oneOf(world.shops)
  const writer = world.draw.weighted(DESK_WRITERS)
  await writer.write(world, shop, world.draw)
  return `${shop.name} ${writer.name}`
}

async function changeSignal(_world: World, handset: Handset): Promise<string> {
  handset.signal = !handset.signal
  if (handset.signal) {
    for (const tab of handset.tabs) await tab.phone.sender.sendNow('online')
  }
  return handset.signal ? 'back' : 'gone'
}

async function passTime(world: World): Promise<string> {
  const minutes = world.draw.oneOf([1, 5, 30, 120, 600])
  await world.pass(minutes * 60_000)
  return `${minutes} min`
}

function changeClock(world: World, handset: Handset): string {
  const { draw } = world
  const faults = [
    ['3 days ahead', () => (handset.skewMs += 3 * DAY_MS)],
    ['a year back', () => (handset.skewMs -= 365 * DAY_MS)],
    ['jumps back', () => (handset.skewMs -= draw.between(1, 120) * 60_000)],
    ['right', () => (handset.skewMs = 0)],
    ['other zone', () => (handset.zone = draw.oneOf(['Etc/UTC', 'Etc/GMT-3', 'Etc/GMT+6']))],
  ] as const
  const [name, turn] = draw.oneOf(faults)
  turn()
  world.fault(`clock ${name}`)
  return name
}

function changeRoom(world: World, handset: Handset): string {
  if (handset.full.size > 0) {
    handset.full.clear()
    return 'again'
  }
  const photos = ['photo', 'photoBytes']
  const tables = world.draw.oneOf([['outbox'], photos, ['row'], ['row', 'outbox', ...photos]])
  for (const table of tables) handset.full.add(table)
  world.fault('noRoom')
  return `none for ${tables.join(', ')}`
}

async function changeSession(world: World, { user }: Handset): Promise<string> {
  if (user.cookie === null) {
    await world.signIn(user)
    return 'regained'
  }
  user.cookie = null
  world.fault('sessionLost')
  return 'lost'
}

async function deliverLate(world: World): Promise<string> {
  const { late, draw } = world
  if (late.length === 0) return 'nothing held up'
  const [sent] = late.splice(draw.below(late.length), 1)
  if (sent !== undefined) await world.deliverLate(sent)
  return 'delivered'
}

function changeVersion(world: World, handset: Handset): string {
  // What today's app has written stays as it wrote it.
  for (const { op, store } of world.ledger.ops.values()) {
    const isHere = store.startsWith(`${handset.name}/`)
    if (isHere && !handset.schemaOf.has(op.id)) handset.schemaOf.set(op.id, op.schema)
  }
  handset.hasBeenOld = true
  handset.protocol = world.draw.oneOf(['now', 'before', 'ancient'] as const)
  if (handset.protocol !== 'now') world.fault(`version ${handset.protocol}`)
  return handset.protocol
}

async function changePerson(world: World, handset: Handset): Promise<string> {
  const user = world.draw.oneOf(handset.users)
  if (user === handset.user) return 'the same'
  await handset.use(user)
  world.fault('otherPerson')
  return user.person.name
}

async function changeRoles(world: World, { user }: Handset): Promise<string> {
  const { shop, person } = user
  const choices: Role[][] = [['guide'], ['mechanic'], ['mechanic', 'parts'], ['dispatcher']]
  const roles = world.draw.oneOf(choices)
  await asShop(shop.id, async (tx) => {
    await setRoles(tx, { personId: person.id, roles })
    await takeChanges(tx, [{ entity: 'person', id: person.id, jobId: null }])
  })
  person.roles = roles
  world.fault('roles')
  return `${person.name} is ${roles.join(', ')}`
}

async function reopenApp(_world: World, handset: Handset): Promise<string> {
  await handset.close()
  return ''
}

function changeLocks(_world: World, handset: Handset): string {
  handset.hasLocks = !handset.hasLocks
  return handset.hasLocks ? 'there' : 'not there'
}

/** A cursor that was never given out: of another shop, of another epoch, of the future. */
async function forgeCursor(world: World, handset: Handset): Promise<string> {
  const tab = await handset.tab()
  const { db } = tab.phone.core
  const [a, b] = world.shops as [SimShop, SimShop]
  const shop = handset.user.shop === a ? b : a
  const cursor = world.draw.oneOf([
    { epoch: 'another', shop: handset.user.shop.id, scopeVersion: 1, seq: 3 },
    { epoch: 'another', shop: shop.id, scopeVersion: 1, seq: 3 },
    { epoch: 'another', shop: handset.user.shop.id, scopeVersion: 99, seq: 999_999 },
  ])
  await writeMeta(db, 'cursor', cursor)
  world.ledger.store(world.storeKey(handset)).cursor = null
  world.fault('forgedCursor')
  return JSON.stringify(cursor)
}

export async function backUp(world: World): Promise<string> {
  if (world.backup !== null && world.draw.chance(0.5)) return 'kept the last one'
  const ids = world.shops.map((shop) => shop.id)
  const roles = world.people().map((person) => [person, person.roles] as const)
  world.backup = {
    data: await takeBackup(world.admin, ids),
    roles,
    revoked: new Set(world.revoked),
  }
  return 'taken'
}

async function restoreBackup(world: World): Promise<string> {
  const { backup } = world
  if (backup === null) return 'no backup'
  const ids = world.shops.map((shop) => shop.id)
  await restore(world.admin, ids, backup.data)
  for (const [person, roles] of backup.roles) person.roles = roles
  world.revoked = new Set(backup.revoked)
  world.restores += 1
  for (const facts of world.ledger.stores.values()) facts.isForgotten ||= facts.isEmptied
  world.fault('restore')
  return 'restored'
}

/** A lost phone, or somebody who left. At most one of each in a run. */
async function revoke(world: World, handset: Handset): Promise<string> {
  const { shop, person } = handset.user
  if (world.revoked.size > 0) return 'enough'
  const now = new Date(world.truth.now()).toISOString()
  const isDevice = world.draw.chance(0.5)
  const { deviceId } = (await handset.tab()).phone
  const with_ = { now: world.truth.now(), newId: () => world.truth.id(4) }
  if (isDevice) {
    // A phone that never reached the shop cannot be taken out.
    const done = await revokePhone(ownerOf(shop), { phoneId: deviceId, reason: 'lost' }, with_)
    if (!done.ok) return 'not known'
  } else await endMembership(shop, person, now)
  for (const one of world.handsets) {
    const same = isDevice ? one === handset : one.users.some((user) => user.person === person)
    if (same) world.revoked.add(`${one.name}/${person.id}`)
  }
  world.fault(isDevice ? 'phoneRevoked' : 'memberLeft')
  return `${isDevice ? handset.name : person.name}`
}

async function endMembership(shop: SimShop, person: SimPerson, now: string): Promise<void> {
  await asShop(shop.id, async (tx) => {
    await revokeMembership(tx, { personId: person.id, now })
    await takeChanges(tx, [{ entity: 'person', id: person.id, jobId: null }])
  })
}
