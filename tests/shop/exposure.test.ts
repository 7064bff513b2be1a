import { describe, expect, test } from 'vitest'
import type { Job } from '@/lib/model/job'
import { byExposure, exposureOf } from '@/lib/shop/exposure'

const base: Job = {
  id: '01980000-0000-7000-8000-0000000000a1',
  machineId: '01980000-0000-7000-8000-000000000301',
  people: { count: 2, hurt: false, missing: false, exposed: false },
  place: {
    latitude: 47.1,
    longitude: -93.2,
    source: 'fix',
    accuracyMetres: 12,
    at: '2026-11-24T18:40:00.000Z',
    asTyped: null,
    words: null,
  },
  complaint: { words: 'starts, dies', symptom: 'startsThenDies', lampOn: true },
  before: ['nothing'],
  airTempC: null,
  weather: null,
  openedAt: '2026-11-24T18:40:00.000Z',
  zone: 'Etc/GMT+6',
  number: 'J-0001',
  state: 'open',
  peopleState: 'withMachine',
  machineState: 'stranded',
  wayOut: null,
  openedBy: '01980000-0000-7000-8000-000000000101',
  assignedTo: [],
}
const people = (change: Partial<Job['people']>) => ({ ...base.people, ...change })

describe('exposureOf', () => {
  test.each([
    ['hurt', { people: people({ hurt: true }) }, false, 'hurtOrMissing'],
    [
      'missing, no position',
      { people: people({ missing: true }), place: null },
      false,
      'hurtOrMissing',
    ],
    ['exposed beside the machine', { people: people({ exposed: true }) }, false, 'exposedAndStill'],
    [
      'exposed but on the way',
      { people: people({ exposed: true }), peopleState: 'onTheWay' as const },
      false,
      'inTheField',
    ],
    ['no position', { place: null }, false, 'noPosition'],
    ['alone by day', { people: people({ count: 1 }) }, false, 'inTheField'],
    ['alone in the dark', { people: people({ count: 1 }) }, true, 'aloneInTheDark'],
    ['two in the dark', {}, true, 'inTheField'],
    [
      'hurt, but safe by now',
      { people: people({ hurt: true }), peopleState: 'safe' as const },
      true,
      'safe',
    ],
  ])('[R19] %s', (_, change, dark, expected) => {
    expect(exposureOf({ ...base, ...change }, dark)).toBe(expected)
  })
})

test('[R19] orders the board by exposure, then by waiting, the same from any start', () => {
  const rows = [
    { job: { ...base, id: 'd', openedAt: '2026-11-24T19:00:00.000Z' } },
    {
      job: { ...base, id: 'c', peopleState: 'safe' as const, openedAt: '2026-11-24T10:00:00.000Z' },
    },
    { job: { ...base, id: 'b', place: null } },
    {
      job: {
        ...base,
        id: 'a',
        people: people({ hurt: true }),
        openedAt: '2026-11-24T20:00:00.000Z',
      },
    },
    { job: { ...base, id: 'e' } },
  ]
  const order = (list: typeof rows) => byExposure(list, () => false).map((row) => row.job.id)
  expect(order(rows)).toEqual(['a', 'b', 'e', 'd', 'c'])
  expect(order([...rows].reverse())).toEqual(['a', 'b', 'e', 'd', 'c'])
})
