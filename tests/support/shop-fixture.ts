// Shops, people, phones, machines and jobs for tests of the database, made through the queries.
import { v7 } from 'uuid'
import { asShop, type ShopTx } from '@/db/client'
import { type Change, takeChanges, takeJobNumbers } from '@/db/queries/changes'
import { enrolDevice } from '@/db/queries/devices'
import { insertJobs } from '@/db/queries/jobs'
import { appendLogEntries } from '@/db/queries/log-entries'
import { insertMachines } from '@/db/queries/machines'
import { insertPeople } from '@/db/queries/people'
import { saveShop } from '@/db/queries/shop'
import type { Id } from '@/lib/model/id'
import type { JobOpening } from '@/lib/model/job'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartRequest } from '@/lib/model/part-request'
import type { Role } from '@/lib/model/role'

export const AT = '2026-11-24T18:40:00.000Z'
export const newId = (): Id => v7()

export type TestPerson = { id: Id; name: string; email: string; roles: Role[]; deviceId: Id }
export type TestShop = { id: Id; people: Record<string, TestPerson>; machineId: Id }

/** A shop with one person for each entry of `people`, each with a phone, and one machine. */
export async function makeShop(people: Record<string, Role[]>): Promise<TestShop> {
  const id = newId()
  const made = Object.fromEntries(
    Object.entries(people).map(([key, roles]) => [
      key,
      {
        id: newId(),
        name: `Test ${key}`,
        email: `${key}-${id}@test.invalid`,
        roles,
        deviceId: newId(),
      },
    ]),
  )
  const machine = machineOf(newId())
  await asShop(id, async (tx) => {
    await saveShop(tx, {
      id,
      name: 'Test shop',
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
      Object.values(made).map((person) => ({ ...person, phone: '000 0001', passwordHash: 'none' })),
    )
    for (const { id: personId, deviceId } of Object.values(made)) {
      await enrolDevice(tx, {
        id: deviceId,
        personId,
        name: 'Test phone',
        publicKey: { kty: 'EC', crv: 'P-256', x: 'x', y: 'y' },
        enrolledAt: AT,
      })
    }
    await insertMachines(tx, [machine])
    await takeChanges(tx, [
      { entity: 'shop', id, jobId: null },
      ...Object.values(made).map(
        (person): Change => ({ entity: 'person', id: person.id, jobId: null }),
      ),
      { entity: 'machine', id: machine.id, jobId: null },
    ])
  })
  return { id, people: made, machineId: machine.id }
}

export const machineOf = (id: Id): Machine => ({
  id,
  modelId: null,
  unitNumber: null,
  makerTyped: null,
  modelTyped: null,
  year: null,
  serial: null,
  hours: null,
  features: { kind: 'atv' },
  fleet: true,
})

export const openingOf = (id: Id, machineId: Id): JobOpening => ({
  id,
  machineId,
  people: { count: 1, hurt: false, missing: false, exposed: true },
  place: null,
  complaint: { words: 'Starts, runs two seconds, dies', symptom: 'startsThenDies', lampOn: true },
  before: ['water', 'recentWork'],
  airTempC: -4.5,
  weather: null,
  openedAt: AT,
  zone: 'Etc/UTC',
})

/** Opens a job in its own transaction and answers its id. */
export async function makeJob(shop: TestShop, by: TestPerson): Promise<Id> {
  const id = newId()
  await asShop(shop.id, (tx) => addJob(tx, { id, shop, by }))
  return id
}

/** Opens a job within a transaction, with number and change. */
export async function addJob(
  tx: ShopTx,
  { id, shop, by }: { id: Id; shop: TestShop; by: TestPerson },
): Promise<void> {
  const [number = ''] = await takeJobNumbers(tx, 1)
  await insertJobs(tx, [
    {
      opening: openingOf(id, shop.machineId),
      stand: STAND,
      number,
      openedBy: by.id,
      openedOn: by.deviceId,
      receivedAt: AT,
    },
  ])
  await takeChanges(tx, [{ entity: 'job', id, jobId: id }])
}

export const STAND = {
  state: 'open',
  peopleState: 'withMachine',
  machineState: 'stranded',
  wayOut: null,
} as const

/** A note, or another body, of a job. */
export const entryOf = (jobId: Id, by: TestPerson, body?: LogBody): LogEntry => ({
  id: newId(),
  jobId,
  supersedes: null,
  happenedAt: AT,
  writtenAt: AT,
  zone: 'Etc/UTC',
  authorId: by.id,
  deviceId: by.deviceId,
  engineVersion: '1',
  bookVersion: 1,
  body: body ?? { kind: 'note', words: 'Plug was wet' },
})

/** Appends notes in a transaction of their own and answers their ids. */
export async function makeEntries(
  shop: TestShop,
  { jobId, by, count }: { jobId: Id; by: TestPerson; count: number },
): Promise<Id[]> {
  const entries = Array.from({ length: count }, () => entryOf(jobId, by))
  await asShop(shop.id, async (tx) => {
    await appendLogEntries(tx, { entries, receivedAt: AT })
    await takeChanges(
      tx,
      entries.map(({ id }): Change => ({ entity: 'logEntry', id, jobId })),
    )
  })
  return entries.map(({ id }) => id)
}

export const requestOf = (jobId: Id): PartRequest => ({
  id: newId(),
  jobId,
  askedAt: AT,
  urgency: 'today',
  note: null,
  lines: [
    {
      id: newId(),
      part: 'ignitionCoil',
      words: 'Ignition coil',
      position: null,
      quantity: 1,
      choice: 'genuine',
      number: null,
      price: { minor: 13_500, currency: 'USD' },
      condemnedBy: null,
    },
  ],
  advice: null,
})
