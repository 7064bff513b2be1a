import { readdirSync, readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { lookAhead } from '@/lib/diag/look-ahead'
import { leftOf, problemOf, weightsOf } from '@/lib/diag/search-problem'
import { marginals, nextAction, posterior } from '@/lib/diag/troubleshoot'
import {
  type NoisyOrModel,
  type SearchState,
  type SingleModel,
  START,
} from '@/lib/diag/troubleshoot-model'
import { bruteMarginals, noisyOrModels, smallModels } from './fixtures/models'
import { bruteOptimum, repairStep, stopCost, treeCost } from './tree-walk'

const folder = new URL('./samples/', import.meta.url)
type Answer = {
  optimum: number
  repairsOnlyOptimum: number
  rootActions: { type: string; id: string; value: number }[]
}
const read = <T>(name: string): T => JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as T
const names = readdirSync(folder)
const strategies = names.filter((n) => n.startsWith('strategy'))
const noisy = names.filter((n) => n.startsWith('noisyor'))

describe('nextAction on the samples', () => {
  it.each(strategies)(
    '[E2.1] %s: the exact optimum, its action and the exact runner-up',
    (name) => {
      const model = read<SingleModel & { answer: Answer }>(name)
      const got = nextAction(model, START)
      const [best, second] = model.answer.rootActions
      expect(got.gap).toBe(0)
      expect(Math.abs(got.expectedCost - model.answer.optimum)).toBeLessThan(1e-9)
      expect({ type: got.type, id: got.id }).toEqual({ type: best!.type, id: best!.id })
      expect(got.runnerUp).toMatchObject({ exact: true })
      expect(Math.abs(got.runnerUp!.expectedCost - second!.value)).toBeLessThan(1e-9)
      expect(got.expectedCost).toBeLessThanOrEqual(model.answer.repairsOnlyOptimum + 1e-9)
    },
  )
  it.each(strategies)(
    '[E2.1] %s: carried through by the tree walker it costs the optimum',
    (name) => {
      const model = read<SingleModel & { answer: Answer }>(name)
      const cost = treeCost(model, (state) => nextAction(model, state))
      expect(Math.abs(cost / model.answer.optimum - 1)).toBeLessThan(1e-9)
    },
  )
  it.each(strategies)(
    '[E2] %s: the look-ahead alone is never dearer than repairs alone and says its gap',
    (name) => {
      const model = read<SingleModel & { answer: Answer }>(name)
      const got = nextAction(model, START, 1)
      expect(got.expectedCost).toBeLessThanOrEqual(model.answer.repairsOnlyOptimum + 1e-9)
      expect(got.expectedCost).toBeGreaterThanOrEqual(model.answer.optimum - 1e-9)
      expect(got.expectedCost - got.gap).toBeLessThanOrEqual(model.answer.optimum + 1e-9)
      const first = model.answer.rootActions.find((a) => a.type === got.type && a.id === got.id)
      expect(first!.value / model.answer.optimum - 1).toBeLessThan(0.02)
    },
  )
  it('[E2] the same input gives the same answer', () => {
    const model = read<SingleModel>('strategy-setup-2.json')
    expect(nextAction(model, START)).toEqual(nextAction(model, START))
  })
})

describe('nextAction against trying everything', () => {
  it('[E2.1] equals brute force on random models with every rule in play', () => {
    fc.assert(
      fc.property(smallModels, (model) => {
        const got = nextAction(model, START)
        expect(got.gap).toBe(0)
        expect(got.expectedCost).toBeCloseTo(bruteOptimum(model), 9)
      }),
      { seed: 20260114, numRuns: 60 },
    )
  })
  it('[E2.1] carried through it costs what it says, also from the middle of a job', () => {
    fc.assert(
      fc.property(smallModels, (model) => {
        expect(treeCost(model, (s) => nextAction(model, s))).toBeCloseTo(
          nextAction(model, START).expectedCost,
          9,
        )
      }),
      { seed: 7, numRuns: 25 },
    )
  })
  it('[E2.1-5] daylight: what does not fit may not start, stops always may', () => {
    const model = read<SingleModel>('strategy-daylight-1.json')
    const late: SearchState = { ...START, elapsed: 56 }
    expect(nextAction(model, late).type).toBe('stop')
    expect(nextAction({ ...model, daylight: { minutes: 0 } }, START).type).toBe('stop')
  })
  it('[E2.1-2] a repair whose part is not on hand is not there', () => {
    const model = read<SingleModel>('strategy-parts-1.json')
    const empty = { ...model, parts: { onHand: [] } }
    const needs = model.faults.filter((f) => f.repair?.needsPart !== undefined).map((f) => f.id)
    expect(needs.length).toBeGreaterThan(0)
    expect(repairStep(empty, { state: START, weights: new Map() }, needs[0]!)).toBeNull()
    expect(needs).not.toContain(nextAction(empty, START).id)
  })
  it('[E2.1-4] what a stop costs can depend on the true fault', () => {
    const model = read<SingleModel>('strategy-parts-1.json')
    const sure = (id: string) => new Map(model.faults.map((f) => [f.id, f.id === id ? 1 : 0]))
    expect(stopCost(model, { state: START, weights: sure('f7') }, 'limp')).toBe(46 + 324)
    expect(stopCost(model, { state: START, weights: sure('f1') }, 'limp')).toBe(46)
  })
  it('[E2] says so when nothing can end the job', () => {
    const model: SingleModel = {
      kind: 'single',
      ratePerMinute: 1,
      faults: [{ id: 'a', prior: 1, repair: null }],
      checks: [],
      stops: [],
    }
    expect(() => nextAction(model, START)).toThrow('noAction')
  })
})

describe('large models', () => {
  it('[E2] 60 suspects and 120 checks: an answer with its gap, the same twice', () => {
    const ids = Array.from({ length: 60 }, (_, i) => `f${i}`)
    const model: SingleModel = {
      kind: 'single',
      ratePerMinute: 1,
      faults: ids.map((id, i) => ({
        id,
        prior: 1 + ((i * 7) % 11),
        repair: i % 4 === 0 ? null : { cost: i % 13, minutes: 4 + (i % 9), setup: [] },
      })),
      checks: Array.from({ length: 120 }, (_, c) => ({
        id: `c${c}`,
        cost: 0,
        minutes: 2 + (c % 7),
        setup: [],
        outcomes: ['good', 'bad'],
        p: Object.fromEntries(
          ids.map((id, f) => [id, (f + c) % 9 === 0 ? [0.1, 0.9] : [0.92, 0.08]]),
        ),
      })),
      stops: [{ id: 'tow', cost: 200 }],
    }
    const got = nextAction(model, START)
    expect(got.expectedCost).toBeLessThanOrEqual(200)
    expect(got.gap).toBeGreaterThan(0)
    expect(nextAction(model, START)).toEqual(got)
    const problem = problemOf(model)
    const one = lookAhead(
      problem,
      { w: weightsOf(model, problem, START), ...leftOf(problem, START), open: 0, elapsed: 0 },
      0,
    )
    expect(got.expectedCost).toBeLessThanOrEqual(one[0]!.cost + 1e-9)
  })
})

describe('marginals', () => {
  it.each(noisy)('[E2.1] %s within 1e-12', (name) => {
    const model = read<NoisyOrModel & { answer: { marginals: Record<string, string> } }>(name)
    const got = marginals(model)
    for (const [fault, p] of Object.entries(model.answer.marginals))
      expect(Math.abs((got[fault] ?? -1) - Number(p))).toBeLessThan(1e-12)
  })
  it('[E1] equal plain enumeration on random models', () => {
    fc.assert(
      fc.property(noisyOrModels(9), (model) => {
        const want = bruteMarginals(model)
        fc.pre(want !== null)
        for (const [id, p] of Object.entries(marginals(model)))
          expect(Math.abs(p - want![id]!)).toBeLessThan(1e-12)
      }),
      { seed: 11, numRuns: 150 },
    )
  })
  it('[E1] forty faults that touch nothing change nothing, exactly', () => {
    const model = read<NoisyOrModel>('noisyor-4.json')
    const more = Array.from({ length: 40 }, (_, i) => ({ id: `barren${i}`, prior: 0.03 }))
    const got = marginals({ ...model, faults: [...model.faults, ...more] })
    for (const [id, p] of Object.entries(marginals(model))) expect(got[id]).toBeCloseTo(p, 13)
    expect(got.barren7).toBeCloseTo(0.03, 13)
  })
  it('[E1] refuses evidence that cannot come about, and too many findings, by name', () => {
    const impossible: NoisyOrModel = {
      kind: 'noisyor',
      condition: 'none',
      faults: [{ id: 'a', prior: 0.5 }],
      findings: [{ id: 's', leak: 0, links: {} }],
      evidence: { s: 1 },
    }
    expect(() => marginals(impossible)).toThrow('impossible')
    const faults = Array.from({ length: 17 }, (_, i) => ({ id: `f${i}`, prior: 0.1 }))
    const links = Object.fromEntries(faults.map((f) => [f.id, 0.5]))
    const findings = Array.from({ length: 22 }, (_, i) => ({ id: `s${i}`, leak: 0.1, links }))
    const many: NoisyOrModel = {
      ...impossible,
      faults,
      findings,
      evidence: Object.fromEntries(findings.map((f) => [f.id, 1 as const])),
    }
    expect(() => marginals(many)).toThrow('tooLarge')
  })
})

describe('S7 as kind single: intermittent misfire, swapped back', () => {
  const p = (xs: number[]) =>
    Object.fromEntries(
      ['coil', 'plug', 'driver', 'injector', 'else'].map((f, i) => [f, [1 - xs[i]!, xs[i]!]]),
    )
  const check = (id: string, xs: number[]) => ({
    id,
    cost: 0,
    minutes: 1,
    setup: [],
    outcomes: ['no', 'yes'],
    p: p(xs),
  })
  const model: SingleModel = {
    kind: 'single',
    ratePerMinute: 1,
    faults: [
      { id: 'coil', prior: 40, repair: null },
      { id: 'plug', prior: 25, repair: null },
      { id: 'driver', prior: 10, repair: null },
      { id: 'injector', prior: 20, repair: null },
      { id: 'else', prior: 5, repair: null },
    ],
    checks: [
      check('gone', [0.95, 0.3, 0.1, 0.1, 0.2]),
      check('goneAndBack', [0.9, 0.02, 0.01, 0.01, 0.03]),
    ],
    stops: [{ id: 'tow', cost: 1 }],
  }
  it('[S7] coil 76.8 and plug 15.2 after the swap; 97.4 after the swap back', () => {
    const after = posterior(model, { ...START, evidence: { gone: 'yes' } })
    expect(100 * after.coil!).toBeCloseTo(76.8, 1)
    expect(100 * after.plug!).toBeCloseTo(15.2, 1)
    const back = posterior(model, { ...START, evidence: { goneAndBack: 'yes' } })
    expect(100 * back.coil!).toBeCloseTo(97.4, 1)
  })
  it('[E2.1-2] repairs that were seen to fail take their fault down', () => {
    const repair = { cost: 1, minutes: 1, setup: [], success: 0.9 }
    const faults = model.faults.map((f) => (f.id === 'coil' ? { ...f, repair } : f))
    const after = posterior({ ...model, faults }, { ...START, tried: ['coil'] })
    expect(after.coil).toBeCloseTo((40 * 0.1) / (40 * 0.1 + 60), 12)
  })
})
