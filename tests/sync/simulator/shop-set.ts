// The two shops of a run, with ids that come from the seed alone.
import { encode } from 'next-auth/jwt'
import { asShop } from '@/db/client'
import { type Change, takeChanges } from '@/db/queries/changes'
import { insertMachines, saveBag, saveMeter, saveModel } from '@/db/queries/machines'
import { insertPeople } from '@/db/queries/people'
import { saveShop } from '@/db/queries/shop'
import { insertSession } from '@/db/queries/sign-in'
import type { Id } from '@/lib/model/id'
import type { Role } from '@/lib/model/role'
import type { Truth } from './truth'

export const SIM_PEOPLE = {
  mechanic: ['mechanic'],
  second: ['mechanic'],
  guide: ['guide'],
  dispatcher: ['dispatcher'],
  parts: ['parts'],
  owner: ['owner'],
  both: ['mechanic', 'parts'],
} as const satisfies Record<string, readonly Role[]>
export type Who = keyof typeof SIM_PEOPLE

export type SimPerson = { id: Id; who: Who; name: string; roles: Role[] }
export type SimShop = {
  id: Id
  name: string
  people: Record<Who, SimPerson>
  modelId: Id
  machineId: Id
}

const SESSION_MS = 30 * 24 * 3_600_000

/** A shop with its people, a model, a machine, a meter and a bag. */
export async function makeSimShop(truth: Truth, name: string): Promise<SimShop> {
  const maker = name === 'A' ? 1 : 2
  const next = () => truth.id(maker)
  const id = next()
  const people = Object.fromEntries(
    Object.entries(SIM_PEOPLE).map(([who, roles]) => [
      who,
      { id: next(), who, name: `${name} ${who}`, roles: [...roles] },
    ]),
  ) as Record<Who, SimPerson>
  const shop = { id, name, people, modelId: next(), machineId: next() }
  await asShop(id, async (tx) => {
    await saveShop(tx, {
      id,
      name: `Shop ${name}`,
      zone: 'Etc/UTC',
      currency: 'USD',
      perMinuteMinor: 100,
      towMinor: 1000,
      recoveryMinor: 1000,
      emergencyNumber: '112',
      phone: '000',
    })
    await insertPeople(
      tx,
      Object.values(people).map((person) => ({
        ...person,
        email: `${person.who}-${id}@test.invalid`,
        phone: null,
        passwordHash: null,
      })),
    )
    await takeChanges(tx, [
      { entity: 'shop', id, jobId: null },
      ...Object.values(people).map(
        (person): Change => ({ entity: 'person', id: person.id, jobId: null }),
      ),
      ...(await addStock(tx, shop, next)),
    ])
  })
  return shop
}

async function addStock(
  tx: Parameters<typeof saveModel>[0],
  shop: Pick<SimShop, 'modelId' | 'machineId' | 'people'>,
  next: () => Id,
): Promise<Change[]> {
  const [meterId, bagId] = [next(), next()]
  await saveModel(tx, {
    id: shop.modelId,
    maker: 'Tarnholt',
    model: 'Moor 450',
    features: { kind: 'atv', strokes: 'four' },
    specSheet: null,
    source: 'invented for the simulator',
  })
  await insertMachines(tx, [
    { ...NO_MACHINE, id: shop.machineId, modelId: shop.modelId, fleet: true },
  ])
  await saveMeter(tx, {
    id: meterId,
    name: 'Test meter',
    functions: {},
    leadsOhm: { low: 0.1, high: 0.3 },
    perKelvin: 0.1,
    source: 'invented for the simulator',
  })
  await saveBag(tx, {
    id: bagId,
    personId: shop.people.mechanic.id,
    parts: [{ part: 'sparkPlug', quantity: 2, knownGood: true }],
    tools: [],
    meterIds: [meterId],
  })
  return [
    { entity: 'machineModel', id: shop.modelId, jobId: null },
    { entity: 'machine', id: shop.machineId, jobId: null },
    { entity: 'meterProfile', id: meterId, jobId: null },
    { entity: 'bag', id: bagId, jobId: null },
  ]
}

export const NO_MACHINE = {
  modelId: null,
  unitNumber: null,
  makerTyped: 'Tarnholt',
  modelTyped: 'Moor 450',
  year: 2021,
  serial: null,
  hours: 412.5,
  features: { kind: 'atv', strokes: 'four' } as const,
  fleet: false,
}

/** The cookie of a new session of that person. */
export async function sessionOf(truth: Truth, shop: SimShop, person: SimPerson): Promise<string> {
  const id = truth.id(3)
  await asShop(shop.id, (tx) =>
    insertSession(tx, {
      id,
      personId: person.id,
      createdAt: new Date(truth.now()).toISOString(),
      expiresAt: new Date(truth.now() + SESSION_MS).toISOString(),
    }),
  )
  const token = await encode({
    secret: process.env.NEXTAUTH_SECRET ?? '',
    token: { sub: person.id, sid: id },
  })
  return `next-auth.session-token=${token}`
}
