import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { outlook } from '@/lib/diag/outlook'
import { specFor } from '@/lib/diag/spec-of'
import { fitnessFor } from '@/lib/diag/verdict-table'
import type { LogBody } from '@/lib/model/log-entry'
import {
  caseOf,
  checked,
  code,
  fixed,
  log,
  ohms,
  pocketMeter,
  smallSpec,
  swapped,
} from './fixtures/entries'
import { smallIndex } from './fixtures/small-book'

const now = [code(1268, 3), checked('plug', 'bad')]
const at = (bodies: LogBody[], meter = false) =>
  caseOf(log(...bodies), { meter: meter ? pocketMeter : null })
const chances = (bodies: LogBody[]) =>
  Object.fromEntries(belief(at(bodies)).suspects.map((s) => [s.fault, s.chance]))

describe('[F5] the outlook of a check', () => {
  it.each(['flow', 'spark', 'module', 'coilOhms'])(
    '[F5] %s: chances of the outcomes sum to 1, and each leads where recording it leads',
    (id) => {
      const rows = outlook(at(now), { kind: 'check', id })
      expect(rows.reduce((sum, r) => sum + r.probability, 0)).toBeCloseTo(1, 12)
      for (const row of rows) {
        const after = chances([...now, checked(id, row.outcome)])
        for (const [fault, p] of Object.entries(row.chances))
          expect(p).toBeCloseTo(after[fault]!, 9)
      }
    },
  )
  it.each(['flow', 'spark', 'module'])(
    '[F5] %s: on average it leaves every suspect where it is',
    (id) => {
      const rows = outlook(at(now), { kind: 'check', id })
      for (const [fault, p] of Object.entries(chances(now)))
        expect(
          rows.reduce((sum, r) => sum + r.probability * (r.chances[fault] ?? 0), 0),
        ).toBeCloseTo(p, 9)
    },
  )
  it('[F5] names its outcomes, the good one first; empty for an unknown id', () => {
    const rows = outlook(at(now), { kind: 'check', id: 'spark' })
    expect(rows.map((r) => [r.outcome, r.name, r.good])).toEqual([
      ['fine', 'Fine', true],
      ['so', 'So so', false],
      ['poor', 'Poor', false],
    ])
    expect(outlook(at(now), { kind: 'check', id: 'nothing' })).toEqual([])
    expect(outlook(at(now), { kind: 'swap', id: 'nothing' })).toEqual([])
  })
})

describe('[F5] the outlook of a check after something was done', () => {
  it.each([
    ['a fix of what it looks at', 'module', [fixed('driver')]],
    ['the same check', 'spark', [checked('spark', 'poor')]],
    ['the same check before and after a fix', 'spark', [checked('spark', 'poor'), fixed('coil')]],
    ['its reading', 'coilOhms', [ohms(1.9)]],
  ])('[F5] %s: each outcome leads where recording it leads', (_, id, done) => {
    const before = [...now, ...done]
    // A reading again takes the reading's place: what is pressed by hand would not count beside it.
    const kept = before.filter((b) => b.kind !== 'reading')
    for (const row of outlook(at(before), { kind: 'check', id })) {
      const after = chances([...kept, checked(id, row.outcome)])
      for (const [fault, p] of Object.entries(row.chances)) expect(p).toBeCloseTo(after[fault]!, 12)
    }
  })
})

describe('[F5] the outlook of a swap', () => {
  it('[F5] three outcomes from the start, two after the good part went in, none when it has told all', () => {
    const names = (bodies: LogBody[]) =>
      outlook(at(bodies), { kind: 'swap', id: 'coilSwap' })
        .filter((r) => r.probability > 0)
        .map((r) => r.outcome)
    expect(names(now)).toEqual(['noChange', 'goneOnce', 'goneAndBack'])
    expect(names([...now, swapped('spareFitted', false)])).toEqual(['goneOnce', 'goneAndBack'])
    expect(names([...now, swapped('spareFitted', false), swapped('oldRefitted', true)])).toEqual([])
    expect(names([...now, swapped('spareFitted', true)])).toEqual([])
  })
  it('[F5] each outcome leads where the steps lead', () => {
    const rows = outlook(at(now), { kind: 'swap', id: 'coilSwap' })
    const want = {
      noChange: chances([...now, swapped('spareFitted', true)]),
      goneOnce: chances([...now, swapped('spareFitted', false), swapped('oldRefitted', false)]),
      goneAndBack: chances([...now, swapped('spareFitted', false), swapped('oldRefitted', true)]),
    }
    for (const row of rows)
      for (const [fault, p] of Object.entries(row.chances))
        expect(p).toBeCloseTo(want[row.outcome as keyof typeof want][fault]!, 9)
  })
})

describe('[F4] a reading before it is taken', () => {
  const check = smallIndex.checks.get('coilOhms')!
  it('[F4] the meter in the bag cannot decide this figure, and mostly it will be too close to call', () => {
    expect(fitnessFor(at(now, true), check)).toMatchObject({ decides: false })
    const rows = outlook(at(now, true), { kind: 'check', id: 'coilOhms' })
    const tooClose = rows.find((r) => r.outcome === 'tooClose')
    expect(tooClose?.probability).toBeGreaterThan(0.8)
    expect(rows.find((r) => r.outcome === 'outHigh')?.chances.coil).toBeGreaterThan(0.95)
    expect(rows.find((r) => r.outcome === 'in')?.probability).toBeLessThan(0.02)
  })
  it('[F4] a fine meter can: within speaks against the coil, and the chances of the verdicts are those of the pieces', () => {
    const functions = { resistance: { percent: 0.1, digits: 1, resolution: 0.001 } }
    const meter = { ...pocketMeter, functions, leadsOhm: { low: 0, high: 0.002 } }
    const c = caseOf(log(...now), { meter })
    expect(fitnessFor(c, check)).toMatchObject({ decides: true })
    const rows = outlook(c, { kind: 'check', id: 'coilOhms' })
    const within = rows.find((r) => r.outcome === 'in')
    expect(within?.chances.coil).toBeLessThan(chances(now).coil!)
    expect(within?.probability).toBeGreaterThan(0.6)
    const high = rows.find((r) => r.outcome === 'outHigh')
    expect(high?.probability).toBeCloseTo(0.2 * chances(now).coil!, 1)
  })
  it('[F3] the sheet first, else the book by its fallback, else nothing', () => {
    expect(specFor(at(now), check)?.id).toBe('primaryResistance')
    const bare = { ...at(now), spec: { ...smallSpec, components: [] } }
    expect(specFor(bare, check)).toBeNull()
    const fallback = { low: 1, high: 2, unit: 'ohm', source: 'common practice, no source' }
    const withFallback = { ...check, reading: { ...check.reading!, fallback } }
    expect(specFor(bare, withFallback)).toMatchObject({ low: 1, high: 2, nominal: null })
    expect(fitnessFor(at(now), check)).toBeNull()
  })
})
