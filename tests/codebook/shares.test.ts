import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { assemble, type Chapter } from '@/db/codebook/chapter'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import type { FaultItem } from '@/lib/model/code-book'

const faults = BOOK_ITEMS.filter((i): i is FaultItem => i.kind === 'fault')

/** A chapter with nothing in it but what is given. */
const chapter = (over: Partial<Chapter>): Chapter => ({
  symptoms: [],
  faults: [],
  shares: [],
  checks: [],
  swaps: [],
  setups: [],
  words: [],
  rows: {},
  swapRows: {},
  unseparated: [],
  ...over,
})

test('[CB9] a list of shares and its something else make 100, or no book is made', () => {
  const list = { symptom: 'startsThenDies', gate: {}, of100: { fuelStale: 60, batteryLow: 30 } }
  expect(() => assemble([chapter({ shares: [{ ...list, somethingElse: 9 }] })])).toThrow(
    'startsThenDies {} makes 99 of 100',
  )
  const { shares } = assemble([chapter({ shares: [{ ...list, somethingElse: 10 }] })])
  expect(shares).toHaveLength(1)
})

test('[CB3] rows for a check that no chapter has make no book', () => {
  const rows = { lookHard: { fuelStale: [10, 90] } }
  expect(() => assemble([chapter({ rows })])).toThrow('rows for what no chapter has: lookHard')
  expect(() => assemble([chapter({ swapRows: { swapHard: {} } })])).toThrow('swapHard')
})

test('[CB9] every fault of the book has a share of some complaint', () => {
  expect(faults.filter((f) => f.shares.length === 0)).toEqual([])
})

test('[R4] the list of the demo ATV holds no carburettor, two-stroke or snowmobile fault', () => {
  const { features } = DEMO_MODELS.find((m) => m.model === 'Moor 450')!
  const isOurs = ({ symptom, gate }: FaultItem['shares'][number]) =>
    symptom === 'startsThenDies' &&
    gate.fuelling?.includes('injection') === true &&
    gate.strokes?.includes('four') === true
  const list = faults.filter(
    (f) =>
      Object.entries(f.gate).every(([k, v]) => v.includes(features[k as 'kind'] ?? '')) &&
      f.shares.some(isOurs),
  )
  const ids = list.map((f) => f.id)
  expect(ids.length).toBeGreaterThanOrEqual(24)
  for (const id of ['jetsBlocked', 'pulsePumpWeak', 'crankSealLeak', 'intakeIce'])
    expect(ids).not.toContain(id)
  const sum = list.flatMap((f) => f.shares.filter(isOurs).map((s) => s.of100))
  expect(sum.reduce((a, b) => a + b, 0)).toBe(93)
})

test('[R4] the four faults of the coil circuit are four', () => {
  const roles = faults.flatMap((f) =>
    f.circuits.flatMap((c) => (c.circuit === 'ignitionCoil1' ? [[f.id, c.role]] : [])),
  )
  expect(roles.sort()).toEqual([
    ['ignitionCoilDriver', 'driver'],
    ['ignitionCoilPart', 'part'],
    ['ignitionCoilSupply', 'supply'],
    ['ignitionCoilWiring', 'wiring'],
  ])
})
