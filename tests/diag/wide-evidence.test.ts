// Evidence that is wide, strong or both (docs/spec/diag.md, Belief, [E3] and [E6]).
import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { nominalOf } from '@/lib/diag/evidence-reading'
import { type Factor, tableFactor } from '@/lib/diag/factor'
import { letsThrough } from '@/lib/diag/gate'
import { MOST_STATES, summarise } from '@/lib/diag/joint'
import { type Machine, meanMachine, runMachine } from '@/lib/diag/machine'
import { noisyOrMarginals } from '@/lib/diag/noisy-or'
import { chancesOf } from '@/lib/diag/outcome-table'
import { outlook } from '@/lib/diag/outlook'
import { specFor } from '@/lib/diag/spec-of'
import { orderOf } from '@/lib/diag/sweep-order'
import type { NoisyOrModel } from '@/lib/diag/troubleshoot-model'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, checked, log, ohms } from './fixtures/entries'
import { check, fault, SMALL_ITEMS, VERDICTS } from './fixtures/small-book'
import { plainlySummed, summed } from './fixtures/summed'

const near = (a: readonly number[], b: readonly number[], within: number) => {
  for (const [f, p] of a.entries()) expect(Math.abs(p - b[f]!)).toBeLessThan(within)
}
/** Rows that are better here and worse there, as no book has them: the widest machines there are. */
const crooked = (suspects: number, seed: number): Factor => {
  const row = (f: number) =>
    chancesOf([0, 1, 2, 3].map((k) => 1 + ((f * 37 + k * 53 + seed * 71) % 29)))
  const rows = new Map(Array.from({ length: suspects }, (_, f) => [f, row(f)] as const))
  return tableFactor({ rows, otherwise: chancesOf([10, 9, 8, 7]) }, [0, 0.3, 1, 0.5])
}
const statesOf = (machines: readonly Machine[]) => orderOf(machines).mostStates
const mean = (values: readonly number[], none: number): Factor => {
  const machine = meanMachine(none, new Map(values.map((v, f) => [f, v])))
  return {
    scope: values.map((_, f) => f),
    at: (present) => runMachine(machine, present),
    machine,
  }
}

describe('[E3] wide evidence', () => {
  it('[E3] wider than its suspects are many it is summed set by set', () => {
    const odds = [0.3, 0.02, 0.1, 0.5, 0.01, 0.2, 0.04, 0.03]
    const factors = Array.from({ length: 9 }, (_, i) => crooked(8, i))
    expect(statesOf(factors.map((f) => f.machine))).toBeGreaterThan(MOST_STATES)
    const [got, want] = [summed(odds, factors), plainlySummed(odds, factors)]
    near(got.marginals, want.marginals, 1e-12)
    near(got.only, want.only, 1e-12)
  })
  it('[E3] and is the same either way, in what it says of itself too', () => {
    const odds = [0.3, 0.02, 0.1, 0.5, 0.01, 0.2, 0.04, 0.03]
    const few = [1, 2, 3].map((i) => crooked(8, i))
    const all = [...few, ...Array.from({ length: 6 }, (_, i) => crooked(8, i + 20))]
    const chance = (set: readonly Factor[]) => {
      let [total, weighed] = [0, 0]
      for (let s = 1; s < 256; s++) {
        const present = odds.flatMap((_, f) => (((s >> f) & 1) === 1 ? [f] : []))
        const prior = present.reduce((product, f) => product * odds[f]!, 1)
        total += prior
        weighed += set.reduce((product, { at }) => product * at(present), prior)
      }
      return weighed / total
    }
    expect(summed(odds, all).logEvidence - summed(odds, few).logEvidence).toBeCloseTo(
      Math.log(chance(all) / chance(few)),
      11,
    )
  })
  it('[E3] over more than sixteen suspects too wide a piece is refused, not guessed at', () => {
    const odds = Array.from({ length: 17 }, () => 0.01)
    const factors = Array.from({ length: 9 }, (_, i) => crooked(17, i))
    expect(summarise(odds, factors)).toBeNull()
    expect(summarise(odds.slice(0, 16), factors.slice(0, 2))).not.toBeNull()
  })
  it('[E3] pieces about one suspect each widen nothing: they multiply its odds', () => {
    const odds = Array.from({ length: 40 }, (_, f) => 0.001 * (f + 1))
    const bad = (f: number) =>
      tableFactor(
        { rows: new Map([[f, [0.2, 0.1, 0.7]]]), otherwise: [0.9, 0.05, 0.05] },
        [0, 0.5, 1],
      )
    const factors = odds.flatMap((_, f) => [bad(f), bad(f)])
    const after = odds.map((o) => o * (0.75 / 0.075) ** 2)
    const atLeastOne = 1 - after.reduce((none, o) => none / (1 + o), 1)
    near(
      summed(odds, factors).marginals,
      after.map((o) => o / (1 + o) / atLeastOne),
      1e-12,
    )
  })
  it('[E3] a bad outcome takes two states, however its rows part among the good ones', () => {
    const table = {
      otherwise: chancesOf([80, 15, 5]),
      rows: new Map([
        [0, chancesOf([60, 5, 35])],
        [1, chancesOf([10, 60, 30])],
      ]),
    }
    expect(tableFactor(table, [0, 0, 1]).machine.end).toHaveLength(2)
  })
  it('[E3] the mean of up to six present is exact; of more it is short by a quarter at most', () => {
    const values = Array.from({ length: 15 }, (_, f) => 0.1 + ((f * 7) % 5))
    const machine = meanMachine(0.7, new Map(values.map((v, f) => [f, v])))
    for (let present = 1; present <= 15; present++) {
      const set = Array.from({ length: present }, (_, i) => (i * 4) % 15)
      const want = set.reduce((sum, f) => sum + values[f]!, 0) / present
      const got = runMachine(machine, set) / want
      if (present <= 6) expect(Math.abs(got - 1)).toBeLessThan(1e-14)
      else expect(Math.abs(got - 0.875)).toBeLessThan(0.125)
    }
    expect(runMachine(machine, [])).toBe(0.7)
  })
})

describe('[E3] more evidence than can be summed', () => {
  const faults = Array.from({ length: 17 }, (_, i) => fault(`many${i}`, 2 + (i % 4)))
  const table = (seed: number) =>
    Object.fromEntries(faults.map((f, i) => [f.id, [10 + ((i * 7 + seed) % 30), 60]]))
  const checks = Array.from({ length: 19 }, (_, i) =>
    check(`wide${i}`, table(i), { otherwise: [97, 3] }),
  )
  const crookedRows = Object.fromEntries(
    faults.map((f, i) => [f.id, [60 + (i % 3), 1, 19 - (i % 3), 20]]),
  )
  const wider = check('wider', crookedRows, {
    outcomes: VERDICTS,
    otherwise: [70, 10, 10, 10],
  })
  const items = [...SMALL_ITEMS.filter((i) => i.kind === 'symptom'), ...faults, ...checks, wider]
  const index = indexBook({ version: 1, hash: '', publishedAt: '', items })
  const bad = checks.map((c) => checked(c.id, 'bad'))
  const of = (bodies: LogBody[]) => belief(caseOf(log(...bodies), { index }))
  it('[E3] what comes when the sum is full is left out, said so, and changes nothing', () => {
    const b = of(bad)
    expect(b.notCounted).toHaveLength(3)
    const why = b.suspects[0]!.why.filter((w) => b.notCounted.includes(w.entryId ?? ''))
    for (const w of why)
      expect(w).toMatchObject({
        saysNothing: true,
        logRatio: 0,
        label: expect.stringContaining('not counted'),
      })
    const chances = (all: typeof b) => all.suspects.map((s) => [s.fault, s.chance])
    expect(chances(b)).toEqual(chances(of(bad.slice(0, 16))))
    // A good outcome has one state: it still counts.
    expect(of([...bad, checked('wide0', 'good')]).notCounted).toHaveLength(2)
  }, 60_000)
  it('[E3] an outlook that cannot be summed has no outcomes', () => {
    const c = caseOf(log(...bad.slice(0, 16)), { index })
    expect(outlook(c, { kind: 'check', id: 'wider' })).toEqual([])
  }, 60_000)
  it('[E3] a noisy-OR file of sixteen faults is summed under any findings', () => {
    const model: NoisyOrModel = {
      id: 'sixteen',
      kind: 'noisyor',
      condition: 'atLeastOne',
      faults: faults.slice(0, 16).map((f, i) => ({ id: f.id, prior: 0.01 + i / 100 })),
      findings: Array.from({ length: 24 }, (_, j) => ({
        id: `finding${j}`,
        leak: 0.02,
        links: Object.fromEntries(
          faults.slice(0, 16).map((f, i) => [f.id, ((i * 5 + j * 3) % 10) / 12]),
        ),
      })),
      evidence: Object.fromEntries(Array.from({ length: 24 }, (_, j) => [`finding${j}`, 1])),
    }
    const sums = model.faults.map(() => 0)
    let total = 0
    for (let set = 1; set < 2 ** 16; set++) {
      const isIn = (f: number) => ((set >> f) & 1) === 1
      let weight = model.faults.reduce((p, { prior }, f) => p * (isIn(f) ? prior : 1 - prior), 1)
      for (const { leak, links } of model.findings)
        weight *=
          1 - model.faults.reduce((p, { id }, f) => (isIn(f) ? p * (1 - links[id]!) : p), 1 - leak)
      total += weight
      for (const f of sums.keys()) if (isIn(f)) sums[f]! += weight
    }
    const got = noisyOrMarginals(model)
    for (const [f, { id }] of model.faults.entries())
      expect(Math.abs(got[id]! - sums[f]! / total)).toBeLessThan(1e-12)
  }, 60_000)
})

describe('[E3] on the own code book', () => {
  const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
  const [model] = DEMO_MODELS
  const empty = buildCase({
    index,
    features: model!.features,
    spec: model!.specSheet,
    job: { complaint: { words: '', symptom: 'startsThenDies', lampOn: true } },
    entries: [],
  })
  const checks = [...index.checks.values()].filter((c) => letsThrough(c.gate, empty.features))
  /** Forty in a row: a long job has a dozen. */
  const bad = new Set(checks.slice(0, 40).map(({ id }) => id))
  const read = (id: string, times: number): LogBody[] => {
    const found = index.checks.get(id)!
    const spec = specFor(empty, found)
    const nominal = found.reading === null ? null : nominalOf(spec, found.reading)
    if (found.reading === null || nominal === null) return []
    const over = { checkId: id, quantity: found.reading.quantity, nulled: true, spec }
    return [ohms(Math.abs(nominal) * times, over)]
  }
  it.each([
    ['every figure within its limits', (id: string) => read(id, 1)],
    [
      'more checks gone bad than any job has',
      (id: string) => (bad.has(id) ? [checked(id, 'bad')] : []),
    ],
  ])(
    '[E3] %s: all of it counts',
    (_, bodyOf) => {
      const bodies = checks.flatMap((c) => bodyOf(c.id))
      expect(bodies.length).toBeGreaterThan(10)
      const b = belief({ ...empty, entries: log(...bodies) })
      expect(b.notCounted).toEqual([])
    },
    60_000,
  )

  it('[E3] every check of the book gone bad: what cannot be summed is listed, the rest gives figures', () => {
    const entries = log(...checks.map(({ id }) => checked(id, 'bad')))
    const b = belief({ ...empty, entries })
    expect(b.notCounted.length).toBeLessThan(entries.length / 2)
    expect(b.notCounted.every((id) => entries.some((entry) => entry.id === id))).toBe(true)
    for (const { chance } of b.suspects) {
      expect(chance).toBeGreaterThanOrEqual(0)
      expect(chance).toBeLessThanOrEqual(1)
    }
  }, 60_000)
})

describe('[E6] evidence stronger than a number', () => {
  const odds = [0.1, 0.05, 0.2]
  const strong = Array.from({ length: 20 }, (_, i) => mean([1, 1e-30, 2e-30], 1e-40 * (i + 1)))
  it('[E6] many readings that only one suspect explains: it is there, alone, and no sum overflows', () => {
    const got = summed(odds, strong)
    expect(got.marginals[0]).toBe(1)
    expect(got.only[1]).toBe(0)
    expect(Number.isFinite(got.logEvidence)).toBe(true)
    expect(got.only.reduce((sum, p) => sum + p, got.twoOrMore)).toBeCloseTo(1, 12)
  })
  it('[E6] many readings that nobody explains keep what they say apart from each other', () => {
    const faint = Array.from({ length: 20 }, () => mean([2e-30, 1e-30, 1e-30], 1e-30))
    const even = Array.from({ length: 20 }, () => mean([2, 1, 1], 1))
    const [got, want] = [summed(odds, faint), plainlySummed(odds, even)]
    near(got.marginals, want.marginals, 1e-12)
    near(got.only, want.only, 1e-12)
  })
  it('[E6] odds beyond the range of a number are certainty', () => {
    const alone = Array.from({ length: 20 }, () =>
      tableFactor({ rows: new Map([[0, [1e-40, 1]]]), otherwise: [1, 1e-40] }, [0, 1]),
    )
    expect(summed(odds, alone).marginals[0]).toBe(1)
    expect(summed(odds, alone).only[0]).toBeCloseTo(1 / 1.05 / 1.2, 12)
  })
})
