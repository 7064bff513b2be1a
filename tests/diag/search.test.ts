// What the search answers at the ends of what a model may say (docs/spec/diag.md, The next action).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { addNode, findNode, startPool } from '@/lib/diag/search-nodes'
import { leftOf, problemOf } from '@/lib/diag/search-problem'
import { nextAction, posterior } from '@/lib/diag/troubleshoot'
import { type SearchState, type SingleModel, START } from '@/lib/diag/troubleshoot-model'
import { FAMILIES, inventedModel } from '../bench/diag/models'
import { wildModels } from './fixtures/wild-models'
import { bruteOptimum, treeCost } from './tree-walk'

const free = { cost: 0, minutes: 0, setup: [] }
const modelOf = (over: Partial<SingleModel>): SingleModel => ({
  kind: 'single',
  ratePerMinute: 1,
  faults: [
    { id: 'a', prior: 0.5, repair: { ...free, cost: 20 } },
    { id: 'b', prior: 0.5, repair: { ...free, cost: 30 } },
  ],
  checks: [],
  stops: [{ id: 'tow', cost: 100 }],
  ...over,
})
const sure = (id: string, minutes = 1): SingleModel['checks'][number] => ({
  id,
  cost: 0,
  minutes,
  setup: [],
  outcomes: ['isA', 'isB'],
  p: { a: [1, 0], b: [0, 1] },
})

describe('[E2] the bounds', () => {
  it('[E2] hold the optimum between them at every limit, whatever a model says', () => {
    fc.assert(
      fc.property(wildModels, fc.constantFrom(undefined, 1, 2, 5, 20), (model, limit) => {
        const want = bruteOptimum(model)
        const { expectedCost, gap } = nextAction(model, START, limit)
        const within = 1e-9 * Math.max(1, Math.abs(want))
        expect(expectedCost).toBeGreaterThan(want - within)
        expect(expectedCost - gap).toBeLessThan(want + within)
        if (gap === 0) expect(Math.abs(expectedCost - want)).toBeLessThan(within)
      }),
      { seed: 2, numRuns: 400 },
    )
  })
  it('[E2] the answers, carried through, cost what the first one says', () => {
    fc.assert(
      fc.property(wildModels, (model) => {
        const { expectedCost, gap } = nextAction(model, START)
        fc.pre(gap === 0)
        expect(treeCost(model, (s) => nextAction(model, s))).toBeCloseTo(expectedCost, 7)
      }),
      { seed: 3, numRuns: 100 },
    )
  })
  it('[E2] a wrong pass can end a job for less than a stop, also after a cure that failed', () => {
    const again = { ...free, fixes: { b: 1 } }
    const model = modelOf({
      faults: [
        { id: 'a', prior: 1, repair: { ...free, cost: 1, success: 0.5 } },
        { id: 'b', prior: 0, repair: null },
      ],
      extraRepairs: ['x', 'y', 'z'].map((id) => ({ id, ...again })),
      verify: { cost: 0, minutes: 0, falsePass: 0.9, comebackCost: 10 },
    })
    // 1 for the cure; half the time three free test runs more, and a tow when all four were seen to fail.
    const want = 1 + 0.5 * (10 * (1 - 0.1 ** 4) + 100 * 0.1 ** 4)
    for (const limit of [1, 3, 1000]) {
      const { expectedCost, gap } = nextAction(model, START, limit)
      expect(expectedCost - gap).toBeLessThan(want + 1e-9)
      expect(expectedCost).toBeGreaterThan(want - 1e-9)
    }
    expect(nextAction(model, START)).toMatchObject({
      gap: 0,
      expectedCost: expect.closeTo(want, 9),
    })
  })
  it('[E2] a job that no row of repairs can end is still carried out where a check comes first', () => {
    const model = modelOf({ checks: [sure('c')], stops: [], daylight: { minutes: 11 } })
    const slow = model.faults.map((f) => ({ ...f, repair: { ...free, minutes: 10 } }))
    expect(nextAction({ ...model, faults: slow }, START)).toMatchObject({
      type: 'check',
      expectedCost: expect.closeTo(11, 9),
      gap: 0,
    })
    expect(() => nextAction({ ...model, faults: slow, daylight: { minutes: 9 } }, START)).toThrow(
      'noAction',
    )
  })
  it('[E2] a dozen ways to cure one fault are not tried in every order', () => {
    const ways = Array.from({ length: 14 }, (_, i) => ({ ...free, cost: 3 + i, id: `x${i}` }))
    const model = modelOf({
      extraRepairs: ways.map((x) => ({ ...x, fixes: { a: 0.3, b: 0.2 } })),
    })
    const { expectedCost, gap } = nextAction(model, START)
    expect(expectedCost).toBeLessThan(20 + 15 + 1e-9)
    expect(gap).toBeGreaterThanOrEqual(0)
  })
})

describe('[E2] points of the search', () => {
  it('[E2] are told apart by every outcome, also where all of them fit no exact number', () => {
    const checks = Array.from({ length: 30 }, (_, c) => ({
      ...sure(`c${c}`),
      outcomes: ['x', 'y', 'z'],
      p: { a: [1, 0, 0], b: [0, 0.5, 0.5] },
    }))
    const pool = startPool(problemOf(modelOf({ checks })))
    const at = { checks: 0, repairs: 3, open: 0, elapsed: 0 }
    const saw = (outcomes: Record<number, number>) => {
      pool.room.code.fill(0)
      for (const [check, o] of Object.entries(outcomes)) {
        const { word, value } = pool.places[Number(check)]!
        pool.room.code[word]! += (o + 1) * value
      }
    }
    const seen = [{ 29: 2 }, { 29: 2, 0: 0 }, { 29: 2, 0: 1 }, { 29: 1, 15: 2 }, { 29: 1 }]
    const nodes = seen.map((outcomes) => {
      saw(outcomes)
      expect(findNode(pool, at)).toBe(-1)
      return addNode(pool, at)
    })
    seen.forEach((outcomes, i) => {
      saw(outcomes)
      expect(findNode(pool, at)).toBe(nodes[i])
      expect(findNode(pool, { ...at, repairs: 1 })).toBe(-1)
      expect(findNode(pool, { ...at, open: 1 })).toBe(-1)
      expect(findNode(pool, { ...at, elapsed: 4 })).toBe(-1)
    })
  })
  it('[E2] are all found again when there are thousands', () => {
    const pool = startPool(problemOf(modelOf({ checks: [sure('c')] })))
    const at = (i: number) => ({
      checks: 0,
      repairs: i % 512,
      open: Math.floor(i / 512),
      elapsed: 0,
    })
    for (let i = 0; i < 5000; i++) expect(addNode(pool, at(i))).toBe(i)
    for (let i = 0; i < 5000; i++) expect(findNode(pool, at(i))).toBe(i)
    expect(findNode(pool, at(5000))).toBe(-1)
  })
})

describe('[E2] expansions where nobody names a limit', () => {
  it('[E2] are as many as 50 ms bear (docs/performance.md): by faults times actions, at every size up to eight', () => {
    for (const size of [5, 6, 7, 8])
      for (const family of FAMILIES) {
        const model = inventedModel(family, { faults: size, checks: size }, 1)
        const { expansions, gap } = nextAction(model, START)
        const { checks, repairs } = leftOf(problemOf(model), START)
        expect(expansions * size * (checks.length + repairs.length)).toBeLessThan(570_000)
        if (size === 5) expect(gap).toBe(0)
      }
  })
})

describe('[E2] where a job stands', () => {
  const twenty = Array.from({ length: 20 }, (_, c) => ({
    ...sure(`c${c}`),
    p: { a: [0.99, 0.01], b: [0.98, 0.02] },
  }))
  it('[E2] evidence as unlikely as 1 in 10^30 leaves the figures whole', () => {
    const model = modelOf({ checks: [...twenty, sure('told')] })
    const evidence = Object.fromEntries(twenty.map((c) => [c.id, 'isB']))
    const state: SearchState = { ...START, evidence }
    const a = 0.01 ** 20 / (0.01 ** 20 + 0.02 ** 20)
    expect(posterior(model, state).a).toBeCloseTo(a, 12)
    // b first, then a where b was not it; the check would cost 1 more than it can save.
    expect(nextAction(model, state)).toMatchObject({
      id: 'b',
      gap: 0,
      expectedCost: expect.closeTo(30 + 20 * a, 9),
    })
  })
  it('[E6] figures that cannot be are named, by the action and by the belief, and never left out in silence', () => {
    const whole = modelOf({
      checks: [sure('c')],
      extraRepairs: [{ ...free, id: 'x', fixes: { a: 0.5 } }],
      setups: [{ id: 's', minutes: 1, requires: [], closedByTest: false }],
      verify: { cost: 1, minutes: 1, falsePass: { a: 0.1 }, comebackCost: 5 },
      daylight: { minutes: 100 },
    })
    const wild: [string, (bad: number) => Partial<SingleModel>][] = [
      ['ratePerMinute', (bad) => ({ ratePerMinute: bad })],
      [
        'faults.b.prior',
        (bad) => ({ faults: [whole.faults[0]!, { id: 'b', prior: bad, repair: null }] }),
      ],
      [
        'faults.a.repair.cost',
        (bad) => ({ faults: [{ id: 'a', prior: 1, repair: { ...free, cost: bad } }] }),
      ],
      [
        'faults.a.repair.minutes',
        (bad) => ({ faults: [{ id: 'a', prior: 1, repair: { ...free, minutes: bad } }] }),
      ],
      [
        'faults.a.repair.success',
        (bad) => ({ faults: [{ id: 'a', prior: 1, repair: { ...free, success: bad } }] }),
      ],
      [
        'extraRepairs.x.fixes.a',
        (bad) => ({ extraRepairs: [{ ...free, id: 'x', fixes: { a: bad } }] }),
      ],
      ['checks.c.cost', (bad) => ({ checks: [{ ...sure('c'), cost: bad }] })],
      ['checks.c.minutes', (bad) => ({ checks: [sure('c', bad)] })],
      ['checks.c.p.a.0', (bad) => ({ checks: [{ ...sure('c'), p: { a: [bad, 0], b: [0, 1] } }] })],
      ['setups.s.minutes', (bad) => ({ setups: [{ ...whole.setups![0]!, minutes: bad }] })],
      ['stops.tow.cost', (bad) => ({ stops: [{ id: 'tow', cost: bad }] })],
      ['verify.comebackCost', (bad) => ({ verify: { ...whole.verify!, comebackCost: bad } })],
      ['verify.falsePass', (bad) => ({ verify: { ...whole.verify!, falsePass: bad } })],
      ['verify.falsePass.a', (bad) => ({ verify: { ...whole.verify!, falsePass: { a: bad } } })],
      ['daylight.minutes', (bad) => ({ daylight: { minutes: bad } })],
    ]
    const named = (field: string) =>
      expect.objectContaining({ kind: 'badModel', context: { field } })
    for (const ask of [nextAction, posterior]) {
      expect(ask(whole, START)).toBeDefined()
      for (const [field, over] of wild)
        for (const bad of [Number.NaN, Number.POSITIVE_INFINITY, -1])
          expect(() => ask({ ...whole, ...over(bad) }, START), `${field} ${bad}`).toThrow(
            named(field),
          )
      const elapsed = Number.NaN
      expect(() => ask(whole, { ...START, elapsed })).toThrow(named('state.elapsed'))
      for (const faults of [[], whole.faults.map((f) => ({ ...f, prior: 0 }))])
        expect(() => ask({ ...whole, faults }, START)).toThrow(named('faults'))
      for (const row of [[0.9, 0.9], [1], [0.5, 0.2, 0.3]]) {
        const checks = [{ ...sure('c'), p: { a: [1, 0], b: row } }]
        expect(() => ask({ ...whole, checks }, START)).toThrow(named('checks.c.p.b'))
      }
      const stops = [{ id: 'tow', cost: 1, costByFault: { a: Number.NaN } }]
      expect(() => ask({ ...whole, stops }, START)).toThrow(named('stops.tow.costByFault.a'))
    }
  })
  it('[E2] names that the model has not are named', () => {
    const model = modelOf({ checks: [sure('c')] })
    const field = (state: Partial<SearchState>): unknown => {
      try {
        return nextAction(model, { ...START, ...state })
      } catch (error) {
        return (error as { context: { field: string } }).context.field
      }
    }
    expect(field({ evidence: { nobody: 'isA' } })).toBe('state.evidence.nobody')
    expect(field({ evidence: { c: 'maybe' } })).toBe('state.evidence.c')
    expect(field({ tried: ['nobody'] })).toBe('state.tried')
    expect(field({ open: ['nobody'] })).toBe('setup nobody')
  })
})
