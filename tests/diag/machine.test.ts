// A machine says what its factor says, of every set of suspects (docs/spec/diag.md, Belief).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { tableFactor } from '@/lib/diag/factor'
import { meanMachine, productMachine, runMachine, seenMachine } from '@/lib/diag/machine'
import { chancesOf, outcomeChances } from '@/lib/diag/outcome-table'

const setsOf = (n: number): number[][] =>
  Array.from({ length: 2 ** n }, (_, set) =>
    Array.from({ length: n }, (_x, f) => f).filter((f) => ((set >> f) & 1) === 1),
  )
const row = (outcomes: number) =>
  fc.array(fc.integer({ min: 0, max: 100 }), { minLength: outcomes, maxLength: outcomes })
/** Any table: steady rows, rows better than `otherwise`, rows that are better here and worse there. */
const tables = fc.integer({ min: 2, max: 5 }).chain((outcomes) =>
  fc.record({
    otherwise: row(outcomes),
    rows: fc.array(row(outcomes), { minLength: 1, maxLength: 6 }),
    weights: fc.array(fc.constantFrom(0, 0, 1, 0.25, 0.75), {
      minLength: outcomes,
      maxLength: outcomes,
    }),
  }),
)

describe('[E1] tables as machines', () => {
  it('[E1] any table under any weights, every set of up to six suspects, in any order', () => {
    fc.assert(
      fc.property(tables, ({ otherwise, rows, weights }) => {
        const table = {
          otherwise: chancesOf(otherwise),
          rows: new Map(rows.map((r, f) => [f, chancesOf(r)])),
        }
        const { at, machine } = tableFactor(table, weights)
        for (const set of setsOf(rows.length)) {
          expect(runMachine(machine, set)).toBeCloseTo(at(set), 12)
          expect(runMachine(machine, [...set].reverse())).toBeCloseTo(at(set), 12)
        }
        for (const [, , weight] of [...machine.moves.values()].flat())
          expect(weight).toBeGreaterThanOrEqual(0)
      }),
      { seed: 11, numRuns: 300 },
    )
  })
  it('[E1] outcomes have chances that sum to 1; none and one present give the rows as they stand', () => {
    fc.assert(
      fc.property(tables, ({ otherwise, rows }) => {
        const table = {
          otherwise: chancesOf(otherwise),
          rows: new Map(rows.map((r, f) => [f, chancesOf(r)])),
        }
        for (const set of setsOf(rows.length)) {
          const chances = outcomeChances(table, set)
          expect(chances.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 12)
          expect(Math.min(...chances)).toBeGreaterThanOrEqual(0)
        }
        expect(outcomeChances(table, [])).toEqual(table.otherwise)
        for (const f of table.rows.keys())
          expect(outcomeChances(table, [f])).toEqual(table.rows.get(f))
      }),
      { seed: 12, numRuns: 200 },
    )
  })
  it('[E1] a plain good outcome is one state, a plain bad one two', () => {
    const table = {
      otherwise: chancesOf([90, 8, 2]),
      rows: new Map([[0, chancesOf([10, 30, 60])]]),
    }
    expect(tableFactor(table, [1, 0, 0]).machine.end).toHaveLength(1)
    expect(tableFactor(table, [0, 1, 0]).machine.end).toHaveLength(2)
    expect(tableFactor(table, [0, 0, 1]).machine.end).toHaveLength(2)
  })
  it('[E1] a fault cannot mend what another breaks; of two that mend the one nearest to otherwise speaks', () => {
    const table = {
      otherwise: chancesOf([50, 50]),
      rows: new Map([
        [0, chancesOf([90, 10])],
        [1, chancesOf([70, 30])],
        [2, chancesOf([20, 80])],
      ]),
    }
    expect(outcomeChances(table, [0, 2])).toEqual(table.rows.get(2))
    expect(outcomeChances(table, [0, 1])).toEqual(table.rows.get(1))
  })
})

describe('[E1] products, seen and means', () => {
  const values = new Map([
    [0, 0.3],
    [1, 0.9],
    [2, 2.5],
    [3, 1e-6],
  ])
  const of = (set: readonly number[]) => set.map((f) => values.get(f) ?? 1)
  it('[E1] a product, a noisy-OR that was seen, a mean of the present ones', () => {
    const stays = new Map([...values].map(([f, v]) => [f, Math.min(1, v)]))
    const sets = new Map([...stays].map(([f, v]) => [f, 1 - v]))
    for (const set of setsOf(5)) {
      const inside = set.filter((f) => f < 4)
      const product = of(inside).reduce((a, b) => a * b, 1)
      const held = inside.reduce((a, f) => a * stays.get(f)!, 1)
      const mean = inside.length === 0 ? 0.7 : of(inside).reduce((a, b) => a + b, 0) / inside.length
      expect(runMachine(productMachine(values), set)).toBeCloseTo(product, 14)
      expect(runMachine(seenMachine(0.01, sets), set)).toBeCloseTo(1 - 0.99 * held, 14)
      expect(runMachine(meanMachine(0.7, values), set)).toBeCloseTo(mean, 14)
    }
  })
})
