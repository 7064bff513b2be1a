import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { SHARE_GROUPS, SHARE_ROWS } from '@/db/codebook/shares'
import type { FaultItem } from '@/lib/model/code-book'

const faults = BOOK_ITEMS.filter((i): i is FaultItem => i.kind === 'fault')

test('[CB9] each column of shares and its something else add to 100', () => {
  Object.values(SHARE_GROUPS).forEach(({ somethingElse }, column) => {
    const listed = SHARE_ROWS.reduce((sum, row) => sum + (row.slice(1)[column] as number), 0)
    expect(listed + somethingElse).toBeCloseTo(100, 9)
  })
})

test('[CB9] every share has its fault and every fault its shares', () => {
  expect(SHARE_ROWS.map(([id]) => id).sort()).toEqual(faults.map((f) => f.id).sort())
})

test('[R4] the list of the demo ATV holds no carburettor, two-stroke or snowmobile fault', () => {
  const { features } = DEMO_MODELS.find((m) => m.model === 'Moor 450')!
  const list = faults.filter(
    (f) =>
      Object.entries(f.gate).every(([k, v]) => v.includes(features[k as 'kind'] ?? '')) &&
      f.shares.some(
        (s) => s.gate.fuelling?.includes('injection') && s.gate.strokes?.includes('four'),
      ),
  )
  const ids = list.map((f) => f.id)
  expect(ids.length).toBeGreaterThanOrEqual(24)
  for (const id of ['jetsBlocked', 'pulsePumpWeak', 'crankSealLeak', 'intakeIce'])
    expect(ids).not.toContain(id)
  const sum = list.flatMap((f) =>
    f.shares.filter((s) => s.gate.strokes?.includes('four')).map((s) => s.of100),
  )
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
