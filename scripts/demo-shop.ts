// The demo shops as data: people, machines, meter, bag. Every name, number and figure is invented.
import type { NewPerson } from '@/db/queries/people'
import type { Bag } from '@/lib/model/bag'
import type { JobOpening } from '@/lib/model/job'
import type { Machine } from '@/lib/model/machine'
import type { MeterProfile } from '@/lib/model/meter-profile'
import type { Role } from '@/lib/model/role'
import type { Shop } from '@/lib/model/shop'

/** `demoId(14)` is 01980000-0000-7000-8000-000000000014: fixed ids of the demo world. */
export const demoId = (tail: string): string => `01980000-0000-7000-8000-${tail.padStart(12, '0')}`

export type DemoPerson = Omit<NewPerson, 'passwordHash'>
const person = (tail: string, name: string, mailbox: string, role: Role): DemoPerson => ({
  id: demoId(tail),
  name,
  email: `${mailbox}@demo.invalid`,
  phone: null,
  roles: [role],
})

/** UTC-6 all year (the sign of Etc zones is reversed). Prices: 96.00 an hour, 300.00 a tow. */
export const SHOP: Shop = {
  id: demoId('1'),
  name: 'Quillhook Yard (demo)',
  zone: 'Etc/GMT+6',
  currency: 'USD',
  perMinuteMinor: 160,
  towMinor: 30_000,
  recoveryMinor: 30_000,
  emergencyNumber: '112',
  phone: '000 0100',
}

/** The stranger: another shop on the same server, of which the first must see nothing. */
export const OTHER_SHOP: Shop = {
  ...SHOP,
  id: demoId('2'),
  name: 'Brackenfold Sheds (demo)',
  phone: '000 0200',
}

export const PEOPLE: DemoPerson[] = [
  person('101', 'Tove Marl', 'mechanic', 'mechanic'),
  person('102', 'Ansel Quay', 'guide', 'guide'),
  person('103', 'Rhee Calder', 'dispatcher', 'dispatcher'),
  person('104', 'Pell Osterby', 'parts', 'parts'),
  person('105', 'Ida Thornwick', 'owner', 'owner'),
  person('106', 'Jory Fenn', 'second', 'mechanic'),
]

export const OTHER_PEOPLE: DemoPerson[] = [person('151', 'Wren Holloway', 'stranger', 'owner')]

/** Units of the fleet with the model each is; features are the model's. */
export const UNITS = [
  { id: demoId('301'), unitNumber: '14', modelId: demoId('201'), year: 2023, hours: 412 },
  { id: demoId('302'), unitNumber: '11', modelId: demoId('201'), year: 2022, hours: 655 },
  { id: demoId('303'), unitNumber: '22', modelId: demoId('202'), year: 2024, hours: 188 },
  { id: demoId('304'), unitNumber: '31', modelId: demoId('203'), year: 2021, hours: 97 },
  { id: demoId('305'), unitNumber: '41', modelId: demoId('204'), year: 2024, hours: 233 },
  { id: demoId('306'), unitNumber: '42', modelId: demoId('204'), year: 2022, hours: 871 },
  { id: demoId('307'), unitNumber: '23', modelId: demoId('205'), year: 2016, hours: 540 },
  { id: demoId('308'), unitNumber: '32', modelId: demoId('206'), year: 2020, hours: 310 },
  { id: demoId('309'), unitNumber: '24', modelId: demoId('207'), year: 2025, hours: 64 },
  { id: demoId('310'), unitNumber: '16', modelId: demoId('208'), year: 2018, hours: 1240 },
  { id: demoId('311'), unitNumber: '17', modelId: demoId('208'), year: 2019, hours: 980 },
  { id: demoId('312'), unitNumber: '33', modelId: demoId('209'), year: 2023, hours: 121 },
  { id: demoId('313'), unitNumber: '51', modelId: demoId('210'), year: 2021, hours: 402 },
] as const

/** Hand-held meter with plain leads; accuracy as a typical data sheet states it, invented. */
export const METER: MeterProfile = {
  id: demoId('401'),
  name: 'Pocket meter (demo)',
  functions: {
    resistance: { percent: 0.8, digits: 3, resolution: 0.1 },
    dcVoltage: { percent: 0.5, digits: 2, resolution: 0.01 },
    acVoltage: { percent: 1.0, digits: 3, resolution: 0.1 },
  },
  leadsOhm: { low: 0.3, high: 0.6 },
  perKelvin: 0.1,
  source: 'demo, invented',
}

const part = (name: string, quantity: number, knownGood = false): Bag['parts'][number] => ({
  part: name,
  quantity,
  knownGood,
})

export const BAG: Bag = {
  id: demoId('501'),
  personId: demoId('101'),
  parts: [
    part('ignitionCoil', 1, true),
    part('sparkPlug', 2),
    part('relay', 2, true),
    part('fuseSet', 1),
    part('fuelFilter', 1),
    part('connectorKit', 1),
    part('wireKit', 1),
    part('fuelHose', 1),
    part('carburettorKit', 1),
    part('intakeBoot', 1),
    part('driveBelt', 1),
  ],
  tools: [
    'multimeter',
    'backProbes',
    'plugSocket',
    'socketSet',
    'screwdriver',
    'pliers',
    'lamp',
    'jar',
    'sparkTester',
    'feelerGauge',
  ],
  meterIds: [METER.id],
}

/** The stranger's one machine and one job, so that there is something to keep apart. */
export const OTHER_MACHINE: Machine = {
  id: demoId('351'),
  modelId: null,
  unitNumber: '3',
  makerTyped: 'Tarnholt',
  modelTyped: 'Moor 450',
  year: null,
  serial: null,
  hours: null,
  features: { kind: 'atv', strokes: 'four', fuelling: 'injection' },
  fleet: true,
}

export const OTHER_JOB: JobOpening = {
  id: demoId('651'),
  machineId: OTHER_MACHINE.id,
  people: { count: 1, hurt: false, missing: false, exposed: false },
  place: null,
  complaint: { words: 'Will not start at the shed', symptom: null, lampOn: null },
  before: ['longStorage'],
  airTempC: null,
  weather: null,
  openedAt: '2026-11-20T15:00:00.000Z',
  zone: 'Etc/GMT+6',
}
