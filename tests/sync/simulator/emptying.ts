// A phone that the shop has taken out empties itself once everything it held is in quarantine. The field
// app does this in lib/sync/client/field-store.ts; here it is done for one phone of a run.
import canonicalize from 'canonicalize'
import { FILE_KIND } from '@/db/queries/quarantine'
import { DeviceDb } from '@/lib/sync/client/device-db'
import { countToLose } from '@/lib/sync/client/keepsake'
import type { Phone } from '@/lib/sync/client/phone'
import { PhoneDb, readMeta } from '@/lib/sync/client/phone-db'
import { beginWipe, resumeWipes, type WipeTools } from '@/lib/sync/client/wipe'
import type { Op } from '@/lib/sync/protocol/op'
import { breaks } from './broken-rule'
import type { Handset, User } from './handset'
import type { World } from './world'

const toolsOf = (world: World, handset: Handset, step: (name: string) => void): WipeTools => ({
  device: new DeviceDb(handset.indexed),
  ports: { clock: { now: () => world.truth.now() } },
  indexed: handset.indexed,
  step,
})

/** Closes a store to writes, if nothing would be lost; the emptying itself follows at the step's end. */
export async function closeStore(
  world: World,
  handset: Handset,
  phone: Phone,
  step: (name: string) => void,
): Promise<boolean> {
  const tools = toolsOf(world, handset, step)
  try {
    const { core, actor } = phone
    return await beginWipe(tools, { core, actor, why: 'handedOver', unsent: 0 })
  } finally {
    tools.device.close()
  }
}

/** Empties the store of whoever uses the phone, if it was closed for that; answers whether it was. */
export async function emptyIfClosed(world: World, handset: Handset): Promise<boolean> {
  const { user } = handset
  const db = new PhoneDb(user.shop.id, user.person.id, handset.indexed)
  const why = await readMeta(db, 'wiping')
  const deviceId = (await readMeta(db, 'device'))?.deviceId ?? null
  if (why === undefined) {
    db.close()
    return false
  }
  await handset.close()
  const tools = toolsOf(world, handset, () => undefined)
  const actor = { shopId: user.shop.id, personId: user.person.id, roles: [], name: null }
  await beginWipe(tools, { core: { db }, actor, why, unsent: await countToLose(db) })
  db.close()
  await resumeWipes(tools)
  tools.device.close()
  world.fault('emptied')
  await settleEmptied(world, { handset, user, deviceId })
  return true
}

const LOSES = 'emptiedLosesNothing'
type Emptied = { handset: Handset; user: User; deviceId: string | null }

/** Q4: what was on the phone is at the shop, also what was written in the very step of its emptying. */
async function settleEmptied(world: World, { handset, user, deviceId }: Emptied): Promise<void> {
  const key = world.storeKey(handset, user)
  const { rows } = await world.admin.query<{ raw: string }>(
    `select raw from quarantine_op where shop_id = $1 and device_id = $2 and kind <> '${FILE_KIND}'
     union all select raw from sync_op where shop_id = $1 and device_id = $2`,
    [user.shop.id, deviceId],
  )
  const there = new Map<string, Op>()
  for (const { raw } of rows) {
    const op = JSON.parse(raw) as Op
    there.set(op.id, op)
  }
  const { ledger } = world
  const texts = [...there.values()].map((op) => canonicalize([op.kind, op.fields]))
  for (const { made, isKept } of ledger.pending.filter((one) => one.store === key)) {
    const lost = made.ops.filter((op) => !texts.includes(canonicalize([op.kind, op.fields])))
    if (isKept && lost.length > 0)
      breaks(LOSES, `${key}: ${lost.map((op) => op.kind).join()} is nowhere`)
  }
  ledger.pending = ledger.pending.filter((one) => one.store !== key)
  for (const op of there.values()) {
    if (ledger.ops.has(op.id)) continue
    const state = { state: 'taken' as const, reason: null, takenAt: world.truth.now() }
    ledger.ops.set(op.id, { op, store: key, isOdd: false, ...state })
  }
  ledger.store(key).isEmptied = true
  handset.users.splice(handset.users.indexOf(user), 1)
  const [next] = handset.users
  if (next) handset.user = next
  else world.handsets = world.handsets.filter((one) => one !== handset)
}

/** Every op of an emptied store lies at the shop, taken, refused or in quarantine. */
export async function holdEmptied(world: World): Promise<void> {
  const { rows } = await world.admin.query<{ op_id: string }>(
    `select op_id from quarantine_op where shop_id = any($1)
     union select op_id from sync_op where shop_id = any($1)`,
    [world.shops.map((shop) => shop.id)],
  )
  const there = new Set(rows.map((row) => row.op_id))
  for (const { op, store } of world.ledger.ops.values()) {
    const facts = world.ledger.store(store)
    if (!facts.isEmptied || facts.isForgotten || there.has(op.id)) continue
    breaks(LOSES, `${store}: ${op.kind} ${op.id} is neither on the phone nor at the shop`)
  }
}
