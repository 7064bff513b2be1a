// The quiet at the end of a run, and what must hold after it: everything has arrived, everybody holds the
// same, and what was refused is kept with its reason.
import canonicalize from 'canonicalize'
import { asShop } from '@/db/client'
import { type LogCursor, pullPage } from '@/db/queries/change-log'
import { openBase } from '@/lib/sync/client/core'
import { isStored, readRow } from '@/lib/sync/client/entities'
import { breaks } from './broken-rule'
import { holdEffects } from './checks-effects'
import { holdVisible, isEven, lookAtPhone } from './checks-phone'
import { holdApart, holdChains, holdDense } from './checks-shop'
import { emptyIfClosed, holdEmptied } from './emptying'
import type { Handset, Tab, User } from './handset'
import type { World } from './world'

/** Most runs of the sender until a phone has nothing more to hand over or to fetch. */
const ROUNDS = 6
const BETWEEN_MS = 15_000
/** Most times round all phones. */
const PASSES = 6

/** Everything works again and everybody sends, until nothing moves any more. */
export async function quieten(world: World): Promise<void> {
  world.faultShare = 0
  for (const sent of world.late.splice(0)) await world.deliverLate(sent)
  for (const handset of world.handsets) {
    Object.assign(handset, { signal: true, protocol: 'now', hasLocks: true })
    handset.full.clear()
    for (const user of handset.users) await signInAgain(world, handset, user)
  }
  // What one phone hands over may be what another one's work waited for: until nobody brings anything new.
  for (let pass = 0, before = -1; pass < PASSES; pass++) {
    const now = await lastChanges(world)
    if (now === before) return
    before = now
    for (const handset of [...world.handsets]) await sendAllOf(world, handset)
  }
}

/** Sum of the shops' last numbers. */
async function lastChanges({ admin, shops }: World): Promise<number> {
  const { rows } = await admin.query<{ sum: number }>(
    'select sum(seq)::float8 as sum from change_log where shop_id = any($1)',
    [shops.map((shop) => shop.id)],
  )
  return rows[0]?.sum ?? 0
}

async function sendAllOf(world: World, handset: Handset): Promise<void> {
  for (const user of [...handset.users]) {
    if (user !== handset.user) await handset.use(user)
    await sendAll(world, handset)
    if (!(await emptyIfClosed(world, handset))) await lookAtPhone(world, handset)
  }
}

async function signInAgain(world: World, handset: Handset, user: User): Promise<void> {
  if (!world.revoked.has(world.storeKey(handset, user))) await world.signIn(user)
}

async function sendAll(world: World, handset: Handset): Promise<void> {
  const tab = await handset.tab()
  for (let round = 0; round < ROUNDS; round++) {
    world.requests = 0
    world.truth.pass(BETWEEN_MS)
    await tab.phone.sender.sendNow('tap')
    const { outbox, photo } = tab.phone.core.db
    const left = await outbox.where('state').anyOf('waiting', 'taken').count()
    const photos = await photo.where('state').equals('waiting').count()
    if (left + photos === 0 && (await isEven(world, tab))) return
  }
}

/** All that must hold when it is quiet. */
export async function holdAll(world: World): Promise<void> {
  await holdDense(world)
  await holdApart(world)
  await holdEmptied(world)
  for (const shop of world.shops) {
    await holdChains(shop)
    await holdEffects(world, shop)
  }
  for (const handset of world.handsets) {
    for (const user of handset.users) {
      if (user !== handset.user) await handset.use(user)
      await holdStore(world, handset)
    }
  }
}

async function holdStore(world: World, handset: Handset): Promise<void> {
  const tab = await handset.tab()
  if (world.revoked.has(world.storeKey(handset))) {
    // One that the shop never knew, or knows no more since a restore, nobody can tell anything: it keeps all.
    if (!(await isKnown(world, tab))) return
    const { outbox, photo } = tab.phone.core.db
    const left = [await outbox.toArray(), await photo.toArray()].flat().map((one) => one.state)
    breaks('revokedIsEmptied', `${world.storeKey(handset)} still holds ${left.join()}`)
  }
  const isEven = await holdVisible(world, handset)
  if (!isEven) {
    const { need, reached } = tab.phone.sender.state.get()
    const why = `reached ${reached}, needs ${need}`
    breaks('quietIsEven', `${world.storeKey(handset)} has not fetched everything: ${why}`)
  }
  await holdOutbox(world, world.storeKey(handset), tab)
  await holdPhotos(world, world.storeKey(handset), tab)
  await holdSame(world.storeKey(handset), tab)
}

async function isKnown(world: World, { phone, user }: Tab): Promise<boolean> {
  const { rowCount } = await world.admin.query(
    'select from device where shop_id = $1 and id = $2',
    [user.shop.id, phone.deviceId],
  )
  return rowCount === 1
}

/** Nothing waits but what waits for something the shop never had. */
async function holdOutbox(world: World, key: string, { phone, user }: Tab): Promise<void> {
  for (const record of await phone.core.db.outbox.toArray()) {
    if (record.state === 'done' || record.state === 'stuck') continue
    const what = `${key}: ${record.kind} ${record.opId} is ${record.state} on ${record.reason}`
    if (record.state !== 'blocked') breaks('quietIsSent', what)
    const { rows } = await world.admin.query(
      `select 1 from job where shop_id = $1 and id::text = $2
       union all select 1 from log_entry where shop_id = $1 and id::text = $2
       union all select 1 from machine where shop_id = $1 and id::text = $2`,
      [user.shop.id, record.reason],
    )
    if (rows.length > 0) breaks('blockedWaitsForSomething', what)
  }
}

/** PH4: a photo whose entry the shop has is there, and the phone knows it. */
async function holdPhotos(world: World, key: string, { phone, user }: Tab): Promise<void> {
  const { rows } = await world.admin.query<{ hash: string }>(
    'select hash from photo where shop_id = $1',
    [user.shop.id],
  )
  const there = new Set(rows.map((row) => row.hash))
  for (const [hash, opId] of world.ledger.store(key).photos) {
    const state = world.ledger.ops.get(opId)?.state
    const photo = await phone.core.db.photo.get(hash)
    if (photo === undefined) breaks('photoIsKept', `${key}: ${hash} is gone`)
    if (state !== 'done') continue
    const what = `${key}: ${hash} is ${photo?.state} (${photo?.reason}) with its entry sent`
    if (photo?.state !== 'sent' || !there.has(hash)) breaks('photoIsSent', what)
  }
}

/** A row as text; the hash of an entry's link in its chain comes to those who ask for it alone. */
const textOf = (row: unknown) => canonicalize({ ...(row as object), hash: undefined })

/** Every row as the shop tells it to one who has nothing yet. */
async function freshPull(user: User): Promise<Map<string, string | undefined>> {
  const told = new Map<string, string | undefined>()
  const pull = (cursor: LogCursor | null) =>
    asShop(user.shop.id, (tx) =>
      pullPage(tx, { actor: { personId: user.person.id }, cursor, limit: 500 }),
    )
  let page = await pull(null)
  for (;;) {
    if (page.kind !== 'page') return told
    for (const { entity, id, row } of page.rows) {
      if (isStored(entity)) told.set(`${entity}/${id}`, textOf(readRow(entity, row)))
    }
    if (!page.more) return told
    page = await pull(page.cursor)
  }
}

/** Everybody converges: each row on the phone is the row a new phone would get, to the letter. */
async function holdSame(key: string, { phone, user }: Tab): Promise<void> {
  const { db, keys } = phone.core
  const truth = await freshPull(user)
  for (const record of await db.row.toArray()) {
    if (record.base === null) continue
    const base = await openBase(keys.store, record.key, { base: record.base, told: record.told })
    const held = textOf(base)
    if (held === truth.get(record.key)) continue
    const shop = truth.get(record.key)
    breaks('everybodyConverges', `${key}: ${record.key}\n  held ${held}\n  shop ${shop}`)
  }
}
