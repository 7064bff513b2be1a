// Fills the demo shops with what is missing: what is there is left alone, whoever changed it, and a
// second run takes no change numbers. `npm run seed -- --passwords` sets the demo people's passwords
// anew. Runs as farbench_owner with the shop set, as row-level security binds the owner, too.
import { existsSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { asShopOn, type Db, openDb, type ShopTx } from '@/db/client'
import { BOOK_ITEMS, UNSEPARATED } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { type Change, takeChanges, takeJobNumbers } from '@/db/queries/changes'
import { bookHash, publishBook, publishedVersion } from '@/db/queries/code-book'
import { insertJobs, jobsById } from '@/db/queries/jobs'
import {
  insertBooking,
  insertMachines,
  listBags,
  listBookings,
  listMeters,
  listModels,
  machinesById,
  saveBag,
  saveMeter,
  saveModel,
} from '@/db/queries/machines'
import { insertParty } from '@/db/queries/parties'
import { insertPeople, listPeople, passwordHashOf, setPassword } from '@/db/queries/people'
import { findShop, saveShop } from '@/db/queries/shop'
import { hashPassword, verifyPassword } from '@/lib/auth/password'
import type { Machine } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import type { Shop } from '@/lib/model/shop'
import { touchedWithdrawals } from '@/lib/sync/server/book/withdraw'
import {
  BAG,
  type DemoPerson,
  demoId,
  METER,
  OTHER_JOB,
  OTHER_MACHINE,
  OTHER_PEOPLE,
  OTHER_SHOP,
  PEOPLE,
  SHOP,
  UNITS,
} from './demo-shop'

type Seeding = { password: string; anew: boolean }

/**
 * Seeds both demo shops. A demo person without a password gets `password`; with `anew` every one does.
 * Answers false when it is not the password of the first person of a shop, who has one of their own.
 */
export async function seedDatabase(
  ownerUrl: string,
  password: string,
  { anew = false } = {},
): Promise<boolean> {
  const db = openDb(ownerUrl, 2)
  try {
    const fits = await seedShop(db, SHOP, PEOPLE, { password, anew })
    await asShopOn(db, SHOP.id, async (tx) => {
      const changes = [
        ...(await seedModels(tx)),
        ...(await seedFleet(tx)),
        ...(await seedMeter(tx)),
        ...(await seedBag(tx)),
        ...(await seedBook(tx)),
      ]
      await takeChanges(tx, changes)
      await seedBooking(tx)
    })
    const fitsOther = await seedShop(db, OTHER_SHOP, OTHER_PEOPLE, { password, anew })
    await asShopOn(db, OTHER_SHOP.id, async (tx) => {
      await takeChanges(tx, [...(await seedBook(tx)), ...(await seedStranger(tx))])
    })
    return fits && fitsOther
  } finally {
    await db.destroy()
  }
}

/** The shop with its people. Hashes are made outside any transaction, as each takes a third of a second. */
async function seedShop(db: Db, shop: Shop, people: DemoPerson[], seeding: Seeding) {
  const { password, anew } = seeding
  const known = await asShopOn(db, shop.id, (tx) =>
    Promise.all(people.map(({ id }) => passwordHashOf(tx, id))),
  )
  const hashes = new Map<string, string>()
  for (const [i, { id }] of people.entries())
    if (anew || known[i] === undefined) hashes.set(id, await hashPassword(password))
  await asShopOn(db, shop.id, async (tx) => {
    const changes: Change[] = []
    if (!(await findShop(tx))) {
      await saveShop(tx, shop)
      changes.push({ entity: 'shop', id: shop.id, jobId: null })
    }
    const present = new Set((await listPeople(tx)).map(({ id }) => id))
    const missing = people.filter(({ id }) => !present.has(id))
    await insertPeople(
      tx,
      missing.map((person) => ({ ...person, passwordHash: null })),
    )
    changes.push(...missing.map(({ id }): Change => ({ entity: 'person', id, jobId: null })))
    for (const [personId, passwordHash] of hashes) await setPassword(tx, { personId, passwordHash })
    await takeChanges(tx, changes)
  })
  const [first] = known
  return anew || first === undefined || (await verifyPassword(password, first))
}

/** Demo models that are not there; one that is may hold figures a person has put right. */
async function seedModels(tx: ShopTx): Promise<Change[]> {
  const present = new Set((await listModels(tx)).map(({ id }) => id))
  const missing = DEMO_MODELS.filter(({ id }) => !present.has(id))
  for (const model of missing) await saveModel(tx, model)
  return missing.map(({ id }) => ({ entity: 'machineModel', id, jobId: null }))
}

async function seedFleet(tx: ShopTx): Promise<Change[]> {
  const models = new Map(DEMO_MODELS.map((model) => [model.id, model]))
  const fleet = UNITS.map((unit) => {
    const model = models.get(unit.modelId)
    if (!model) throw new Error(`No demo model ${unit.modelId} for unit ${unit.unitNumber}`)
    return toMachine(unit, model)
  })
  return await addMachines(tx, fleet)
}

const toMachine = (unit: (typeof UNITS)[number], model: MachineModel): Machine => ({
  ...unit,
  makerTyped: null,
  modelTyped: null,
  serial: null,
  features: model.features,
  fleet: true,
})

async function addMachines(tx: ShopTx, machines: Machine[]): Promise<Change[]> {
  const ids = machines.map(({ id }) => id)
  const present = new Set((await machinesById(tx, ids)).map(({ id }) => id))
  const missing = machines.filter(({ id }) => !present.has(id))
  await insertMachines(tx, missing)
  return missing.map(({ id }) => ({ entity: 'machine', id, jobId: null }))
}

async function seedMeter(tx: ShopTx): Promise<Change[]> {
  if ((await listMeters(tx, [METER.id])).length > 0) return []
  await saveMeter(tx, METER)
  return [{ entity: 'meterProfile', id: METER.id, jobId: null }]
}

async function seedBag(tx: ShopTx): Promise<Change[]> {
  if ((await listBags(tx, [BAG.id])).length > 0) return []
  await saveBag(tx, BAG)
  return [{ entity: 'bag', id: BAG.id, jobId: null }]
}

const PAIRS = UNSEPARATED.map(
  ({ faults: [a, b], reason }): { faults: [string, string]; reason: string } => ({
    faults: [a, b],
    reason,
  }),
)

/** Version 1, and a next one when the shipped book changed, unless a person has published since. */
async function seedBook(tx: ShopTx): Promise<Change[]> {
  const newest = await publishedVersion(tx)
  if (newest && (newest.publishedBy !== null || newest.hash === bookHash(BOOK_ITEMS))) return []
  const version = (newest?.version ?? 0) + 1
  const publishedAt = new Date().toISOString()
  await publishBook(tx, {
    version,
    items: BOOK_ITEMS,
    publishedAt,
    publishedBy: null,
    origin: { basedOn: newest?.version ?? null, madeBy: null, note: null, unseparated: PAIRS },
  })
  return [{ entity: 'book', id: String(version), jobId: null }, ...(await touchedWithdrawals(tx))]
}

/** Unit 11 is out tomorrow from 9 to 17 by the shop's clock (UTC-6); made once, on the first run. */
async function seedBooking(tx: ShopTx): Promise<void> {
  const [machineId, partyId] = [demoId('302'), demoId('701')]
  const isMade =
    (await listBookings(tx, { machineId, after: '2000-01-01T00:00:00.000Z' })).length > 0
  if (isMade || (await machinesById(tx, [machineId])).length === 0) return
  await insertParty(tx, {
    id: partyId,
    kind: 'hirer',
    name: 'Orla Penhale (demo)',
    phone: null,
    email: 'hirer@demo.invalid',
  })
  const DAY_MS = 86_400_000
  const tomorrow = new Date(Date.now() + DAY_MS).toISOString().slice(0, 10)
  await insertBooking(tx, {
    id: demoId('801'),
    machineId,
    partyId,
    fromAt: `${tomorrow}T15:00:00.000Z`,
    toAt: `${tomorrow}T23:00:00.000Z`,
    zone: SHOP.zone,
    state: 'booked',
  })
}

async function seedStranger(tx: ShopTx): Promise<Change[]> {
  const changes = await addMachines(tx, [OTHER_MACHINE])
  if ((await jobsById(tx, [OTHER_JOB.id])).length > 0) return changes
  const [number = ''] = await takeJobNumbers(tx, 1)
  const stand = {
    state: 'open',
    peopleState: 'safe',
    machineState: 'stranded',
    wayOut: null,
  } as const
  await insertJobs(tx, [
    {
      opening: OTHER_JOB,
      stand,
      number,
      openedBy: demoId('151'),
      openedOn: null,
      receivedAt: OTHER_JOB.openedAt,
    },
  ])
  return [...changes, { entity: 'job', id: OTHER_JOB.id, jobId: OTHER_JOB.id }]
}

function demoPassword(): string {
  const file = resolve(fileURLToPath(new URL('../.env.local', import.meta.url)))
  const text = existsSync(file) ? readFileSync(file, 'utf8') : ''
  const password = process.env.DEMO_PASSWORD ?? /^DEMO_PASSWORD=(.+)$/m.exec(text)?.[1]
  if (!password) throw new Error('DEMO_PASSWORD is not set; npm start writes it to .env.local')
  return password
}

if (process.argv[1] && resolve(process.argv[1]) === fileURLToPath(import.meta.url)) {
  const { startDatabase } = await import('./db.mjs')
  const url = process.env.DATABASE_OWNER_URL ?? (await startDatabase()).ownerUrl
  const began = performance.now()
  const anew = process.argv.includes('--passwords')
  const fits = await seedDatabase(url, demoPassword(), { anew })
  if (!fits)
    console.log(
      'DEMO_PASSWORD is not the password of every demo person: it was set by hand, or .env.local was lost. `npm run seed -- --passwords` sets all of them anew.',
    )
  console.log(`Demo shops are in place (${((performance.now() - began) / 1000).toFixed(1)} s)`)
}
