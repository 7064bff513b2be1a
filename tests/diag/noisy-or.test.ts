// Noisy-OR marginals against exact arithmetic, at extreme priors, leaks and links (docs/spec/diag.md, Belief).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { noisyOrMarginals } from '@/lib/diag/noisy-or'
import type { NoisyOrModel } from '@/lib/diag/troubleshoot-model'
import { type Dyadic, exact, less, ONE, plus, ratio, times, ZERO } from './dyadic'

/** Every set of faults, in exact arithmetic; null when the evidence cannot come about. */
function exactMarginals(model: NoisyOrModel): Record<string, number> | null {
  const { faults, findings, evidence } = model
  const sums = faults.map(() => ZERO)
  let total = ZERO
  for (let set = model.condition === 'atLeastOne' ? 1 : 0; set < 2 ** faults.length; set++) {
    const present = faults.flatMap((_, f) => (((set >> f) & 1) === 1 ? [f] : []))
    const chance = faults.reduce((product, { prior }, f) => {
      const own = present.includes(f) ? exact(prior) : less(ONE, exact(prior))
      return times(product, own)
    }, ONE)
    const weight = findings.reduce((product, finding) => {
      const seen = evidence[finding.id]
      return seen === undefined
        ? product
        : times(product, worthOf(seen, absentAt(finding, present)))
    }, chance)
    total = plus(total, weight)
    for (const f of present) sums[f] = plus(sums[f]!, weight)
  }
  if (total.n === 0n) return null
  return Object.fromEntries(faults.map(({ id }, f) => [id, ratio(sums[f]!, total)]))
}

/** P(the finding is absent | these faults, f0 to f4 by their places). */
const absentAt = (
  { leak, links }: NoisyOrModel['findings'][number],
  present: readonly number[],
): Dyadic =>
  present.reduce(
    (absent, f) => times(absent, less(ONE, exact(links[`f${f}`] ?? 0))),
    less(ONE, exact(leak)),
  )

function worthOf(seen: NoisyOrModel['evidence'][string], absent: Dyadic): Dyadic {
  const present = less(ONE, absent)
  if (seen === 0) return absent
  if (seen === 1) return present
  const [a, b] = seen.virtual
  return plus(times(exact(a), absent), times(exact(b), present))
}

const extreme = fc.constantFrom(0, 1, 1e-12, 1 - 1e-12, 1e-100, 0.5, 0.03, 0.97)
const seen = fc.oneof(
  fc.constantFrom(0 as const, 1 as const),
  fc.tuple(extreme, extreme).map((virtual) => ({ virtual })),
)
const models: fc.Arbitrary<NoisyOrModel> = fc
  .record({
    kind: fc.constant('noisyor' as const),
    condition: fc.constantFrom('none' as const, 'atLeastOne' as const),
    faults: fc
      .array(extreme, { minLength: 1, maxLength: 5 })
      .map((priors) => priors.map((prior, f) => ({ id: `f${f}`, prior }))),
    findings: fc.array(
      fc.record({
        leak: extreme,
        links: fc.dictionary(fc.constantFrom('f0', 'f1', 'f2', 'f3', 'f4'), extreme),
      }),
      { maxLength: 4 },
    ),
    seen: fc.array(fc.option(seen, { nil: undefined }), { minLength: 4, maxLength: 4 }),
  })
  .map(({ kind, condition, faults, findings, seen: list }) => {
    const ids = new Set(faults.map((f) => f.id))
    const evidence: Record<string, NonNullable<(typeof list)[number]>> = {}
    const named = findings.map(({ leak, links }, i) => {
      const one = list[i]
      if (one !== undefined) evidence[`s${i}`] = one
      const kept = Object.entries(links).filter(([f]) => ids.has(f))
      return { id: `s${i}`, leak, links: Object.fromEntries(kept) }
    })
    return { kind, condition, faults, findings: named, evidence }
  })

describe('[E3] noisy-OR in exact arithmetic', () => {
  it('[E3] extreme priors, leaks, links and virtual evidence: to 1e-12, and impossible is said', () => {
    let impossible = 0
    let right = 0
    fc.assert(
      fc.property(models, (model) => {
        const want = exactMarginals(model)
        if (want === null) {
          impossible++
          expect(() => noisyOrMarginals(model)).toThrow('impossible')
          return
        }
        right++
        for (const [id, p] of Object.entries(noisyOrMarginals(model)))
          expect(Math.abs(p - want[id]!)).toBeLessThan(1e-12)
      }),
      { seed: 21, numRuns: 600 },
    )
    expect(impossible).toBeGreaterThan(20)
    expect(right).toBeGreaterThan(200)
  })
  it('[E3] virtual evidence [0, 1] is "present", [1, 0] is "absent", and only the ratio counts', () => {
    const base: NoisyOrModel = {
      kind: 'noisyor',
      condition: 'atLeastOne',
      faults: [0.1, 0.02, 0.3].map((prior, f) => ({ id: `f${f}`, prior })),
      findings: [{ id: 's', leak: 0.05, links: { f0: 0.8, f1: 0.4 } }],
      evidence: {},
    }
    const at = (s: NoisyOrModel['evidence'][string]) =>
      noisyOrMarginals({ ...base, evidence: { s } })
    for (const [id, p] of Object.entries(at(1))) {
      expect(at({ virtual: [0, 1] })[id]).toBeCloseTo(p, 14)
      expect(at({ virtual: [0, 1e-200] })[id]).toBeCloseTo(p, 14)
    }
    for (const [id, p] of Object.entries(at(0)))
      expect(at({ virtual: [1, 0] })[id]).toBeCloseTo(p, 14)
    for (const [id, p] of Object.entries(noisyOrMarginals(base)))
      expect(at({ virtual: [0.3, 0.3] })[id]).toBeCloseTo(p, 14)
  })
  it('[E3] sixteen present findings over forty faults: bounded memory, and the same as with the faults turned about', () => {
    const faults = Array.from({ length: 40 }, (_, f) => ({ id: `f${f}`, prior: 0.01 + f / 4000 }))
    const findings = Array.from({ length: 16 }, (_, i) => ({
      id: `s${i}`,
      leak: 0.02,
      links: Object.fromEntries(
        faults.flatMap((f, n) => ((n + i) % 3 === 0 ? [[f.id, 0.3 + ((n * i) % 7) / 10]] : [])),
      ),
    }))
    const evidence = Object.fromEntries(findings.map((s) => [s.id, 1 as const]))
    const model: NoisyOrModel = { kind: 'noisyor', condition: 'none', faults, findings, evidence }
    const got = noisyOrMarginals(model)
    const other = noisyOrMarginals({ ...model, faults: [...faults].reverse() })
    for (const { id } of faults) expect(Math.abs(got[id]! - other[id]!)).toBeLessThan(1e-11)
  }, 60_000)
  it('[E3] a long row of unlikely evidence keeps its digits: eighty findings of chance 2 in a million each', () => {
    const faults = Array.from({ length: 80 }, (_, f) => ({ id: `f${f}`, prior: 1e-6 }))
    const findings = faults.map(({ id }) => ({ id: `s${id}`, leak: 1e-6, links: { [id]: 1 } }))
    const evidence = Object.fromEntries(findings.map((s) => [s.id, 1 as const]))
    const own = 1e-6 / (1e-6 + (1 - 1e-6) * 1e-6)
    for (const condition of ['none', 'atLeastOne'] as const) {
      const got = noisyOrMarginals({ kind: 'noisyor', condition, faults, findings, evidence })
      for (const p of Object.values(got)) expect(p).toBeCloseTo(own, 12)
    }
  })
  it('[E3] a number that is no chance is named; an id may be any word', () => {
    const model = (prior: number): NoisyOrModel => ({
      kind: 'noisyor',
      condition: 'none',
      faults: [
        { id: 'constructor', prior },
        { id: 'toString', prior: 0.5 },
      ],
      findings: [{ id: 'valueOf', leak: 0.1, links: { toString: 0.5 } }],
      evidence: {},
    })
    for (const wrong of [Number.NaN, Number.POSITIVE_INFINITY, -0.1, 1.1])
      expect(() => noisyOrMarginals(model(wrong))).toThrow(
        expect.objectContaining({
          kind: 'badModel',
          context: { field: 'faults.constructor.prior' },
        }),
      )
    expect(noisyOrMarginals(model(0.25))).toEqual({ constructor: 0.25, toString: 0.5 })
  })
})
