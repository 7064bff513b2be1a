// What holds of every belief (docs/spec/diag.md, Belief).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { belief, logOdds } from '@/lib/diag/belief'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import { type Factor, tableFactor } from '@/lib/diag/factor'
import { chancesOf } from '@/lib/diag/outcome-table'
import { candidates } from '@/lib/diag/priors'
import { posterior } from '@/lib/diag/troubleshoot'
import { START } from '@/lib/diag/troubleshoot-model'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, checked, code, couldNot, fixed, log, ohms, run, swapped } from './fixtures/entries'
import { smallModels } from './fixtures/models'
import { plainlySummed, summed } from './fixtures/summed'

/** Everything a log can hold about the small book, fixes and what comes after them included. */
const bodies: fc.Arbitrary<LogBody> = fc.oneof(
  fc.tuple(fc.constantFrom(1268, 168), fc.constantFrom(3, 5, 31)).map(([s, f]) => code(s, f)),
  fc.constantFrom(3, 5).map((fmi) => code(1268, fmi, 'stored')),
  fc
    .tuple(
      fc.constantFrom('plug', 'flow', 'spark', 'module', 'coilOhms'),
      fc.constantFrom('good', 'bad', 'odd', 'so', 'in', 'tooClose', 'outHigh'),
    )
    .map(([id, outcome]) => checked(id, outcome)),
  fc.constant(couldNot('flow')),
  fc.double({ min: 0, max: 1e6, noNaN: true }).map((value) => ohms(value)),
  fc.double({ min: 0, max: 5, noNaN: true }).map((value) => ohms(value, { subject: 'knownGood' })),
  fc
    .tuple(
      fc.constantFrom('spareFitted' as const, 'oldRefitted' as const, 'newFitted' as const),
      fc.constantFrom(true, false, null),
    )
    .map(([step, there]) => swapped(step, there)),
  fc.constantFrom('coil', 'wire', 'filter').map(fixed),
  fc
    .tuple(fc.nat(20), fc.nat(3), fc.boolean())
    .map(([starts, faults, hot]) => run(starts, faults, hot)),
)
const logs = fc.array(bodies, { maxLength: 14 })

describe('[E1] of any log', () => {
  it('[E1] chances lie within 0 and 1, the pieces of "why" sum to the change, and a shut gate stays shut', () => {
    fc.assert(
      fc.property(logs, (list) => {
        const b = belief(caseOf(log(...list)))
        expect(b.notCounted).toEqual([])
        expect(b.suspects.map((s) => s.fault)).not.toContain('jets')
        expect(b.suspects.map((s) => s.fault)).toContain(SOMETHING_ELSE)
        for (const s of b.suspects) {
          expect(s.chance).toBeGreaterThanOrEqual(0)
          expect(s.chance).toBeLessThanOrEqual(1)
          const sum = s.why.reduce((total, w) => total + w.logRatio, 0)
          expect(Math.abs(logOdds(s.chance) - logOdds(s.prior) - sum)).toBeLessThan(1e-9)
        }
        expect(b.chanceOfTwoOrMore).toBeGreaterThanOrEqual(0)
        expect(b.chanceOfTwoOrMore).toBeLessThanOrEqual(1)
      }),
      { seed: 31, numRuns: 300 },
    )
  })
  it('[E1] at least one is present: the chances sum to no less than 1', () => {
    fc.assert(
      fc.property(logs, (list) => {
        const sum = belief(caseOf(log(...list))).suspects.reduce((total, s) => total + s.chance, 0)
        expect(sum).toBeGreaterThan(1 - 1e-9)
      }),
      { seed: 32, numRuns: 100 },
    )
  })
  it('[E1] what could not be done changes nothing, wherever it stands', () => {
    const shown = (list: LogBody[]) =>
      belief(caseOf(log(...list))).suspects.map((s) => [s.fault, s.chance])
    fc.assert(
      fc.property(logs, fc.nat(14), (list, at) => {
        const more = [...list.slice(0, at), couldNot('plug'), ...list.slice(at)]
        expect(shown(more)).toEqual(shown(list))
      }),
      { seed: 33, numRuns: 100 },
    )
  })
})

const row = fc.array(fc.integer({ min: 0, max: 100 }), { minLength: 3, maxLength: 3 })
const weights = fc.array(fc.double({ min: 0.01, max: 1, noNaN: true }), {
  minLength: 3,
  maxLength: 3,
})
const factorOf = (rows: number[][], otherwise: number[], w: readonly number[]): Factor =>
  tableFactor(
    { rows: new Map(rows.map((r, f) => [f, chancesOf(r)])), otherwise: chancesOf(otherwise) },
    w,
  )
const factors = fc.array(
  fc
    .tuple(fc.array(row, { minLength: 1, maxLength: 5 }), row, weights)
    .map(([rows, otherwise, w]) => factorOf(rows, otherwise, w)),
  { minLength: 1, maxLength: 5 },
)
const odds = fc.array(fc.double({ min: 1e-6, max: 3, noNaN: true }), {
  minLength: 5,
  maxLength: 8,
})
const near = (a: readonly number[], b: readonly number[], within: number) => {
  for (const [f, p] of a.entries()) expect(Math.abs(p - b[f]!)).toBeLessThan(within)
}

describe('[E1] of any evidence', () => {
  it('[E1] the order of the pieces does not matter', () => {
    fc.assert(
      fc.property(odds, factors, (o, list) => {
        near(summed(o, list).marginals, summed(o, [...list].reverse()).marginals, 1e-12)
      }),
      { seed: 34, numRuns: 150 },
    )
  })
  it('[E1] likelihoods that are the same in every state change nothing', () => {
    fc.assert(
      fc.property(odds, factors, row, weights, (o, list, same, w) => {
        const silent = factorOf([same, same, same], same, w)
        const even = factorOf([[10, 20, 70]], [30, 30, 40], [0.4, 0.4, 0.4])
        near(summed(o, [...list, silent, even]).marginals, summed(o, list).marginals, 1e-12)
      }),
      { seed: 35, numRuns: 150 },
    )
  })
  it('[E1] virtual evidence at its ends is hard evidence, and scale does not matter', () => {
    fc.assert(
      fc.property(odds, fc.array(row, { minLength: 1, maxLength: 5 }), row, (o, rows, other) => {
        const at = (w: number[]) => summed(o, [factorOf(rows, other, w)])
        for (const k of [0, 1, 2]) {
          const hard = [0, 1, 2].map((j) => (j === k ? 1 : 0))
          const almost = hard.map((x) => (x === 1 ? 0.5 : 1e-15))
          near(at(hard).marginals, at(almost).marginals, 1e-9)
        }
        near(at([0.2, 0.4, 0.6]).marginals, at([0.1, 0.2, 0.3]).marginals, 1e-12)
      }),
      { seed: 36, numRuns: 100 },
    )
  })
  it('[E1] the chance of a set by the sums is that of the plain sum over all sets', () => {
    fc.assert(
      fc.property(odds, factors, (o, list) => {
        const [got, want] = [summed(o, list), plainlySummed(o, list)]
        near(got.marginals, want.marginals, 1e-11)
        near(got.only, want.only, 1e-11)
      }),
      { seed: 37, numRuns: 100 },
    )
  })
})

describe('[E2.1] kind single', () => {
  it('[E2.1] the posterior is that of Bayes by hand', () => {
    fc.assert(
      fc.property(smallModels, fc.nat(), (model, pick) => {
        const evidence = Object.fromEntries(
          model.checks.map((c, i) => [c.id, c.outcomes[(pick + i) % c.outcomes.length]!]),
        )
        const joint = model.faults.map(({ id, prior }) =>
          model.checks.reduce((p, c) => p * c.p[id]![c.outcomes.indexOf(evidence[c.id]!)]!, prior),
        )
        const total = joint.reduce((a, b) => a + b, 0)
        fc.pre(total > 0)
        const got = posterior(model, { ...START, evidence })
        for (const [f, { id }] of model.faults.entries())
          expect(Math.abs(got[id]! - joint[f]! / total)).toBeLessThan(1e-12)
      }),
      { seed: 38, numRuns: 150 },
    )
  })
  it('[R5] priors are odds: without evidence each chance is its own odds over all sets but none', () => {
    const c = caseOf([])
    const list = candidates(c)
    const q = list.reduce((product, s) => product * (1 + s.odds), 1)
    for (const s of belief(c).suspects) {
      const own = list.find((x) => x.fault === s.fault)!.odds
      expect(s.chance).toBeCloseTo((own / (1 + own)) * (q / (q - 1)), 12)
    }
  })
})
