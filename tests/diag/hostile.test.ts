// Numbers and words that nobody should send, and what is answered (docs/spec/diag.md, Belief and Readings).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { MOST_PIECES } from '@/lib/diag/evidence'
import { likelihood } from '@/lib/diag/evidence-reading'
import { chancesOf, outcomeChances } from '@/lib/diag/outcome-table'
import { outlook } from '@/lib/diag/outlook'
import { chanceOfTwo, solveC } from '@/lib/diag/priors'
import { canDecide, judge, type ReadingInput } from '@/lib/diag/reading'
import { rectSumCdf } from '@/lib/diag/rect-sum'
import type { LogBody, LogEntry, ReadingBody } from '@/lib/model/log-entry'
import {
  caseOf,
  checked,
  code,
  fixed,
  log,
  ohms,
  pocketMeter,
  run,
  swapped,
} from './fixtures/entries'
import { coilInput, coilSpec } from './fixtures/readings'
import { check, fault, SMALL_ITEMS } from './fixtures/small-book'

/** Every number anywhere in an answer; none may be NaN. */
function numbersIn(answer: unknown): number[] {
  if (typeof answer === 'number') return [answer]
  return typeof answer === 'object' && answer !== null
    ? Object.values(answer).flatMap(numbersIn)
    : []
}
const expectNumbers = (answer: unknown) => {
  for (const x of numbersIn(answer)) expect(x).not.toBeNaN()
}

const WILD = [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, -1e300, 1e300]
const wild = fc.constantFrom(...WILD, 0, -1, 1e-300, 1, 1e12)

describe('[E6] hostile readings', () => {
  const fields: [string, (x: number) => Partial<ReadingInput>][] = [
    ['value', (x) => ({ value: x })],
    [
      'meterFunction.percent',
      (x) => ({ meterFunction: { percent: x, digits: 3, resolution: 0.1 } }),
    ],
    [
      'meterFunction.digits',
      (x) => ({ meterFunction: { percent: 1, digits: x, resolution: 0.1 } }),
    ],
    [
      'meterFunction.resolution',
      (x) => ({ meterFunction: { percent: 1, digits: 3, resolution: x } }),
    ],
    ['leadsOhm.low', (x) => ({ leadsOhm: { low: x, high: 0.6 } })],
    ['leadsOhm.high', (x) => ({ leadsOhm: { low: 0.3, high: x } })],
    ['perKelvin', (x) => ({ perKelvin: x })],
    ['partTempC', (x) => ({ partTempC: x })],
    ['meterTempC', (x) => ({ meterTempC: x })],
    ['spec.nominal', (x) => ({ spec: { ...coilSpec, nominal: x } })],
    ['spec.tolerancePercent', (x) => ({ spec: { ...coilSpec, tolerancePercent: x } })],
    ['spec.low', (x) => ({ spec: { ...coilSpec, low: x } })],
    ['spec.high', (x) => ({ spec: { ...coilSpec, high: x } })],
    ['spec.partTempC', (x) => ({ spec: { ...coilSpec, partTempC: x } })],
    ['extra.1', (x) => ({ extra: [{ source: 'x', halfWidth: x }] })],
    ['conditions.1', (x) => ({ conditions: [{ kind: 'altitude', asked: 0, halfWidth: x }] })],
    [
      'conditions.1.asked',
      (x) => ({ conditions: [{ kind: 'engineSpeed', asked: x, halfWidth: 1 }] }),
    ],
  ]
  it.each(fields)(
    '[E6] %s: no number, and far too large, is named and judges nothing',
    (field, over) => {
      for (const x of WILD) {
        const input = { ...coilInput, value: 1, ...over(x) }
        const got = judge(input)
        expect(got.problem).toMatchObject({ field })
        expect(got.verdict).toBeNull()
        expectNumbers(got)
        if (field === 'value') continue
        expect(canDecide(input).words).toContain(field)
        expectNumbers(canDecide(input))
      }
    },
  )
  it('[E6] below nothing, and limits the wrong way about', () => {
    expect(judge({ ...coilInput, value: -5 }).problem).toMatchObject({
      kind: 'below',
      field: 'value',
    })
    expect(judge({ ...coilInput, nulled: true, value: -0.1 }).problem).toBeNull()
    const spec = { ...coilSpec, low: 2, high: 1 }
    expect(judge({ ...coilInput, value: 1, spec }).problem).toMatchObject({
      field: 'spec.low',
      limit: 1,
    })
    expect(judge({ ...coilInput, value: 1, partTempC: -234.45 }).problem).toMatchObject({
      field: 'partTempC',
    })
  })
  it('[E6] any mixture: a problem, or figures', () => {
    fc.assert(
      fc.property(wild, wild, wild, wild, wild, fc.boolean(), (a, b, c, d, e, overRange) => {
        const input: ReadingInput = {
          ...coilInput,
          value: a,
          overRange,
          leadsOhm: { low: 0, high: b },
          partTempC: c,
          perKelvin: d,
          spec: { ...coilSpec, nominal: e },
        }
        expectNumbers(judge(input))
        expectNumbers(canDecide(input))
      }),
      { seed: 51, numRuns: 500 },
    )
  })
  it('[E6] in a log they say nothing, with the field, and the rest of the log still counts', () => {
    const chances = (...bodies: LogBody[]) =>
      belief(caseOf(log(...bodies))).suspects.map((s) => [s.fault, s.chance])
    for (const over of [
      { value: Number.NaN },
      { perKelvin: -1 },
      { partTempC: -300 },
    ] as Partial<ReadingBody>[]) {
      const odd = ohms(1, { asTyped: '1', ...over })
      expect(chances(code(1268, 3), odd)).toEqual(chances(code(1268, 3)))
      const why = belief(caseOf(log(odd))).suspects[0]!.why.at(-1)
      expect(why).toMatchObject({
        saysNothing: true,
        label: expect.stringContaining(Object.keys(over)[0]!),
      })
    }
  })
  it('[E6] likelihoods stay above nought however far out, and without pieces', () => {
    for (const at of [0, -1e9, 1e12, 1e300])
      for (const pieces of [[], [{ weight: 1, from: 0.9, to: 1.1 }]])
        for (const overRange of [true, false]) {
          const p = likelihood(pieces, { at, standardU: 0, overRange }, 0.5)
          expect(p).toBeGreaterThan(0)
          expect(p).toBeLessThan(Number.POSITIVE_INFINITY)
        }
  })
  it('[E6] sums of rectangles: no number is refused, infinity is the end', () => {
    expect(() => rectSumCdf([1], Number.NaN)).toThrow('badNumber')
    expect(() => rectSumCdf([Number.NaN], 0)).toThrow('badNumber')
    expect(rectSumCdf([1, 2], Number.POSITIVE_INFINITY)).toBe(1)
    expect(rectSumCdf([1, 2], Number.NEGATIVE_INFINITY)).toBe(0)
    expect(rectSumCdf([], 0)).toBe(1)
    expect(rectSumCdf([0, -3], -1)).toBe(0)
  })
})

describe('[E6] hostile books', () => {
  const symptom = SMALL_ITEMS.filter((i) => i.kind === 'symptom')
  const caseWith = (items: typeof SMALL_ITEMS, ...bodies: LogBody[]) =>
    caseOf(log(...bodies), { index: indexBook({ version: 1, hash: '', publishedAt: '', items }) })
  it('[E6] an empty book, one suspect, shares of nothing: something else stands for what is not listed', () => {
    for (const items of [[], symptom, [...symptom, fault('lone', 100)]]) {
      const b = belief(caseWith(items, code(1268, 3), ohms(1), run(3, 0)))
      expect(b.suspects.some((s) => s.fault === 'somethingElse')).toBe(true)
      expectNumbers(b)
    }
    for (const share of [Number.NaN, 0, -4, Number.POSITIVE_INFINITY]) {
      const b = belief(caseWith([...symptom, fault('odd', share), fault('lone', 50)]))
      expect(b.suspects.map((s) => s.fault).sort()).toEqual(['lone', 'somethingElse'])
      expectNumbers(b)
    }
  })
  it('[E6] rows of zeros, of no numbers and of another length say nothing', () => {
    const faults = [fault('a', 40), fault('b', 40)]
    for (const row of [
      [0, 0],
      [Number.NaN, 1],
      [-3, -1],
      [1, 2, 3],
      [Number.POSITIVE_INFINITY, 1],
    ]) {
      const items = [...symptom, ...faults, check('odd', { a: row }, { otherwise: [50, 50] })]
      const b = belief(caseWith(items, checked('odd', 'bad')))
      expectNumbers(b)
      expect(b.suspects.reduce((sum, s) => sum + s.chance, 0)).toBeGreaterThan(1)
      expectNumbers(outlook(caseWith(items), { kind: 'check', id: 'odd' }))
    }
    expect(chancesOf([0, 0])).toEqual([0.5, 0.5])
    expect(chancesOf(Array.from({ length: 2000 }, () => 1)).every((p) => p > 0)).toBe(true)
    const sure = { rows: new Map([[0, [0, 1]]]), otherwise: [0, 1] }
    expect(outcomeChances(sure, [0])).toEqual([0, 1])
  })
  it('[E6] any word may be an id', () => {
    for (const id of ['__proto__', 'constructor', 'toString', 'x'.repeat(100_000)]) {
      const items = [
        ...symptom,
        fault(id, 40),
        fault('b', 30),
        check(id, Object.fromEntries([[id, [10, 90]]])),
      ]
      const b = belief(
        caseWith(items, checked(id, 'bad'), fixed(id), swapped('spareFitted', false)),
      )
      expect(b.suspects[0]?.fault).toBe(id)
      const rows = outlook(caseWith(items), { kind: 'check', id })
      expect(Object.hasOwn(rows[0]!.chances, id)).toBe(true)
      expectNumbers([b, rows])
    }
  })
  it('[E6] shares that are none, and chances of two beyond reach', () => {
    for (const shares of [[], [1], [Number.NaN, 1], [0, 0], [1e300, 1e300], [-1, 2]])
      for (const two of [...WILD, 0, 1, 0.05]) {
        expect(solveC(shares, two)).toBeGreaterThan(0)
        expect(Number.isFinite(solveC(shares, two))).toBe(true)
        expect(chanceOfTwo(shares, 0.1)).toBeGreaterThanOrEqual(0)
      }
  })
})

describe('[E6] long logs', () => {
  const many = (n: number, bodyAt: (i: number) => LogBody): LogEntry[] => {
    const [model] = log(ohms(1))
    return Array.from({ length: n }, (_, i) => {
      const at = new Date(Date.UTC(2026, 10, 24) + i * 1000).toISOString()
      const id = `01980000-0000-7000-8000-${String(i).padStart(12, '0')}`
      return { ...model!, id, happenedAt: at, writtenAt: at, body: bodyAt(i) }
    })
  }
  const KINDS: [string, (i: number) => LogBody][] = [
    ['readings', (i) => ohms(0.4 + (i % 50) / 100)],
    [
      'readings with fixes between',
      (i) => (i % 2 === 0 ? fixed('coil') : ohms(0.4 + (i % 50) / 100)),
    ],
    ['outcomes', (i) => checked('plug', i % 3 === 0 ? 'good' : 'bad')],
    ['swap steps', (i) => swapped(i % 2 === 0 ? 'spareFitted' : 'oldRefitted', i % 4 < 2)],
    ['runs with fixes between', (i) => (i % 3 === 0 ? fixed('wire') : run(2, i % 2))],
  ]
  it.each(KINDS)(
    '[E6] ten thousand %s: reckoned in time, with a bound on what speaks',
    (_, bodyAt) => {
      const started = performance.now()
      const b = belief(caseOf(many(10_000, bodyAt), { meter: pocketMeter }))
      expect(performance.now() - started).toBeLessThan(20_000)
      expectNumbers(b.suspects.map((s) => s.chance))
      // Beside the share only so many pieces speak; the steps of one swap are one piece.
      const why = b.suspects[0]!.why.filter((w) => !w.saysNothing && w.about !== 'swap')
      expect(why.length).toBeLessThanOrEqual(MOST_PIECES + 1)
    },
    60_000,
  )
  it('[E6] ten times the readings take some ten times as long, not a hundred', () => {
    const time = (n: number) => {
      const c = caseOf(many(n, (i) => ohms(0.4 + (i % 50) / 100)))
      const started = performance.now()
      belief(c)
      return performance.now() - started
    }
    time(1000)
    const few = Math.min(time(1000), time(1000), time(1000))
    expect(time(10_000)).toBeLessThan(40 * Math.max(few, 2))
  }, 60_000)
})
