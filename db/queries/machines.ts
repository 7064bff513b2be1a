import { type Selectable, sql } from 'kysely'
import type { Bag } from '@/lib/model/bag'
import type { Id } from '@/lib/model/id'
import type { Machine, MachineRow } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import type { MeterProfile } from '@/lib/model/meter-profile'
import type { ShopTx } from '../client'
import type {
  BagTable,
  MachineModelTable,
  MachineTable,
  MeterProfileTable,
} from '../tables/machine'
import { type AlsoEnteredRow, alsoEnteredOf } from './field-history'

/** Stores machines under their own ids; an id that is there is an error of the caller. Take change numbers. */
export async function insertMachines(tx: ShopTx, machines: readonly Machine[]): Promise<void> {
  if (machines.length === 0) return
  await tx
    .insertInto('machine')
    .values(
      machines.map((machine) => ({
        ...machine,
        shopId: tx.shopId,
        features: JSON.stringify(machine.features),
      })),
    )
    .execute()
}

/** The SQL of a job's machine: the one that stands for it, should it have been merged (R13). */
export const machineOfJob = () =>
  sql<Id>`(select coalesce(o.merged_root, o.id) from machine o
    where o.shop_id = job.shop_id and o.id = job.machine_id)`

/** Answers a machine, or the one that stands for it; undefined when it is not there. */
export async function findMachine(tx: ShopTx, id: Id): Promise<MachineRow | undefined> {
  const [machine] = await machinesById(tx, [id])
  if (machine?.mergedInto === undefined) return machine
  return (await machinesById(tx, [machine.mergedInto]))[0]
}

/** Answers the machines with these ids that are there, in no order. */
export async function machinesById(tx: ShopTx, ids: readonly Id[]): Promise<MachineRow[]> {
  if (ids.length === 0) return []
  const rows = await machines(tx).where('id', 'in', ids).execute()
  return rows.map(toMachine)
}

const machines = (tx: ShopTx) =>
  tx
    .selectFrom('machine')
    .selectAll()
    .select(() => alsoEnteredOf(tx, sql.ref('machine.id')).as('alsoEntered'))
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)

type StoredMachine = Selectable<MachineTable> & { alsoEntered: AlsoEnteredRow[] | null }

const toMachine = (row: StoredMachine): MachineRow => ({
  id: row.id,
  modelId: row.modelId,
  unitNumber: row.unitNumber,
  makerTyped: row.makerTyped,
  modelTyped: row.modelTyped,
  year: row.year,
  serial: row.serial,
  hours: row.hours,
  features: row.features,
  fleet: row.fleet,
  ...(row.mergedRoot === null ? {} : { mergedInto: row.mergedRoot }),
  ...(row.revived ? { revived: true } : {}),
  ...(row.alsoEntered === null ? {} : { alsoEntered: row.alsoEntered }),
})

/** Answers the models with these ids, or all of the shop; in no order. */
export async function listModels(tx: ShopTx, ids?: readonly Id[]): Promise<MachineModel[]> {
  if (ids?.length === 0) return []
  let query = tx
    .selectFrom('machineModel')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)
  if (ids) query = query.where('id', 'in', ids)
  return (await query.execute()).map(toModel)
}

const toModel = (row: Selectable<MachineModelTable>): MachineModel => ({
  id: row.id,
  maker: row.maker,
  model: row.model,
  features: row.features,
  specSheet: row.specSheet,
  source: row.source,
})

/** Stores a model, or its new state; take a change number (machineModel). */
export async function saveModel(tx: ShopTx, model: MachineModel): Promise<void> {
  const row = {
    maker: model.maker,
    model: model.model,
    features: JSON.stringify(model.features),
    specSheet: model.specSheet === null ? null : JSON.stringify(model.specSheet),
    source: model.source,
  }
  await tx
    .insertInto('machineModel')
    .values({ shopId: tx.shopId, id: model.id, ...row })
    .onConflict((on) => on.columns(['shopId', 'id']).doUpdateSet(row))
    .execute()
}

/** Answers the meter profiles with these ids, or all of the shop; in no order. */
export async function listMeters(tx: ShopTx, ids?: readonly Id[]): Promise<MeterProfile[]> {
  if (ids?.length === 0) return []
  let query = tx
    .selectFrom('meterProfile')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)
  if (ids) query = query.where('id', 'in', ids)
  return (await query.execute()).map(toMeter)
}

const toMeter = (row: Selectable<MeterProfileTable>): MeterProfile => ({
  id: row.id,
  name: row.name,
  functions: row.functions,
  leadsOhm: row.leadsOhm,
  perKelvin: row.perKelvin,
  source: row.source,
})

/** Stores a meter profile, or its new state; take a change number (meterProfile). */
export async function saveMeter(tx: ShopTx, meter: MeterProfile): Promise<void> {
  const row = {
    name: meter.name,
    functions: JSON.stringify(meter.functions),
    leadsOhm: JSON.stringify(meter.leadsOhm),
    perKelvin: meter.perKelvin,
    source: meter.source,
  }
  await tx
    .insertInto('meterProfile')
    .values({ shopId: tx.shopId, id: meter.id, ...row })
    .onConflict((on) => on.columns(['shopId', 'id']).doUpdateSet(row))
    .execute()
}

/** Answers the bags with these ids, or all of the shop; in no order. */
export async function listBags(tx: ShopTx, ids?: readonly Id[]): Promise<Bag[]> {
  if (ids?.length === 0) return []
  let query = tx
    .selectFrom('bag')
    .selectAll()
    .where('shopId', '=', tx.shopId)
    .where('deletedAt', 'is', null)
  if (ids) query = query.where('id', 'in', ids)
  return (await query.execute()).map(toBag)
}

const toBag = (row: Selectable<BagTable>): Bag => ({
  id: row.id,
  personId: row.personId,
  parts: row.parts,
  tools: row.tools,
  meterIds: row.meterIds,
})

/** Stores a bag, or what is in it now; take a change number (bag). */
export async function saveBag(tx: ShopTx, bag: Bag): Promise<void> {
  const row = { parts: JSON.stringify(bag.parts), tools: bag.tools, meterIds: bag.meterIds }
  await tx
    .insertInto('bag')
    .values({ shopId: tx.shopId, id: bag.id, personId: bag.personId, ...row })
    .onConflict((on) => on.columns(['shopId', 'id']).doUpdateSet(row))
    .execute()
}

/** A machine let out from one instant to another. */
export type Booking = {
  id: Id
  machineId: Id
  partyId: Id | null
  fromAt: string
  toAt: string
  zone: string
  state: 'booked' | 'out' | 'back' | 'cancelled'
}

/** Stores a booking; an id that is there is left as it is. */
export async function insertBooking(tx: ShopTx, booking: Booking): Promise<void> {
  await tx
    .insertInto('booking')
    .values({ shopId: tx.shopId, ...booking })
    .onConflict((on) => on.doNothing())
    .execute()
}

/** Answers a machine's bookings that end after `after`, the next one first; cancelled ones left out. */
export async function listBookings(
  tx: ShopTx,
  { machineId, after }: { machineId: Id; after: string },
): Promise<Booking[]> {
  return await tx
    .selectFrom('booking')
    .select(['id', 'machineId', 'partyId', 'fromAt', 'toAt', 'zone', 'state'])
    .where('shopId', '=', tx.shopId)
    .where('machineId', '=', machineId)
    .where('toAt', '>', after)
    .where('state', '!=', 'cancelled')
    .orderBy('fromAt')
    .execute()
}
