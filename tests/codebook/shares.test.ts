import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { DIES_SHARES } from '@/db/codebook/shares-dies'
import type { FaultItem } from '@/lib/model/code-book'

const faults = BOOK_ITEMS.filter((i): i is FaultItem => i.kind === 'fault')

test('[CB9] each list of shares and its something else add to 100', () => {
  for (const { of100, somethingElse } of DIES_SHARES) {
    const listed = Object.values(of100).reduce((sum, share) => sum + share, 0)
    expect(listed + somethingElse).toBeCloseTo(100, 9)
  }
})

test('[CB9] every share has its fault and every fault its shares', () => {
  const listed = DIES_SHARES.flatMap(({ of100 }) => Object.keys(of100))
  expect([...new Set(listed)].sort()).toEqual(faults.map((f) => f.id).sort())
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
