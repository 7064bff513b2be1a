import { describe, expect, it } from 'vitest'
import { repairsOnly } from '@/lib/diag/repairs-only'
import { leftOf, problemOf, weightsOf } from '@/lib/diag/search-problem'
import { nextAction } from '@/lib/diag/troubleshoot'
import { type SingleModel, START } from '@/lib/diag/troubleshoot-model'
import { treeCost } from '../diag/tree-walk'

const unit = { cost: 1, minutes: 0, setup: [] }

describe('Jensen et al., AI EDAM 15 (2001), Fig. 1: dependent actions, unit costs', () => {
  const model: SingleModel = {
    kind: 'single',
    ratePerMinute: 0,
    faults: [0.2, 0.25, 0.4, 0.15].map((prior, i) => ({ id: `f${i + 1}`, prior, repair: null })),
    extraRepairs: [
      { id: 'A1', ...unit, fixes: { f1: 1, f2: 1 } },
      { id: 'A2', ...unit, fixes: { f2: 1, f3: 1 } },
      { id: 'A3', ...unit, fixes: { f3: 1, f4: 1 } },
    ],
    checks: [],
    stops: [],
  }
  it('[STD] the optimum is 1.45', () => {
    const got = nextAction(model, START)
    expect(got.expectedCost).toBeCloseTo(1.45, 12)
    expect(treeCost(model, (s) => nextAction(model, s))).toBeCloseTo(1.45, 12)
  })
  it('[STD] greedy by p/c costs 1.50', () => {
    const order = ['A2', 'A1', 'A3']
    expect(treeCost(model, (s) => ({ type: 'repair', id: order[s.tried.length]! }))).toBeCloseTo(
      1.5,
      12,
    )
    expect(nextAction(model, { ...START, tried: ['A2'] }).id).toBe('A1')
  })
})

describe('Lin (2014), Fig. 2: a strategy with a question, unit costs', () => {
  const ids = ['f1', 'f2', 'f3']
  const model: SingleModel = {
    kind: 'single',
    ratePerMinute: 0,
    faults: [0.5, 0.25, 0.25].map((prior, i) => ({ id: ids[i]!, prior, repair: unit })),
    checks: [
      {
        id: 'Q',
        cost: 1,
        minutes: 0,
        setup: [],
        outcomes: ['two', 'three'],
        p: { f1: [0.5, 0.5], f2: [1, 0], f3: [0, 1] },
      },
    ],
    stops: [],
  }
  it('[STD] A1, Q, then A2 or A3 costs 2', () => {
    const cost = treeCost(model, ({ tried, evidence }) => {
      if (tried.length === 0) return { type: 'repair', id: 'f1' }
      if (!('Q' in evidence)) return { type: 'check', id: 'Q' }
      return { type: 'repair', id: evidence.Q === 'two' ? 'f2' : 'f3' }
    })
    expect(cost).toBeCloseTo(2, 12)
  })
  it('[STD] A1, A2, A3 costs 1.75, which is what the engine finds', () => {
    expect(
      treeCost(model, ({ tried }) => ({ type: 'repair', id: ids[tried.length]! })),
    ).toBeCloseTo(1.75, 12)
    expect(nextAction(model, START).expectedCost).toBeCloseTo(1.75, 12)
  })
})

describe('Heckerman, Breese and Rommelse, CACM 38(3) (1995): repairs in p/c order', () => {
  const priors = [0.1, 0.45, 0.25, 0.2]
  const costs = [2, 9, 3, 8]
  const model: SingleModel = {
    kind: 'single',
    ratePerMinute: 1,
    faults: priors.map((prior, i) => ({
      id: `f${i}`,
      prior,
      repair: { cost: costs[i]!, minutes: 0, setup: [] },
    })),
    checks: [],
    stops: [],
  }
  const order = [2, 0, 1, 3]
  const ecr = order.reduce(
    (sum, f, i) => sum + costs[f]! * (1 - order.slice(0, i).reduce((p, e) => p + priors[e]!, 0)),
    0,
  )
  it('[STD] ECR = sum of C_i (1 - sum of earlier p_j), and p/c order is optimal without questions', () => {
    expect(nextAction(model, START)).toMatchObject({
      id: 'f2',
      expectedCost: expect.closeTo(ecr, 12),
    })
    const problem = problemOf(model)
    const spot = {
      w: weightsOf(model, problem, START),
      ...leftOf(problem, START),
      open: 0,
      elapsed: 0,
    }
    expect(repairsOnly(problem, spot, spot.repairs)).toBeCloseTo(ecr, 12)
    expect(treeCost(model, (s) => nextAction(model, s))).toBeCloseTo(ecr, 12)
  })
  it('[STD] a service call ends the row where it is cheaper than going on', () => {
    const called = { ...model, stops: [{ id: 'call', cost: 6 }] }
    const after = nextAction(called, { ...START, tried: ['f2', 'f0'] })
    expect(after).toMatchObject({ type: 'stop', id: 'call', expectedCost: 6 })
  })
})
