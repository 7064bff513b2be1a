// Model files that nobody should write: one sentence with the field, or the right answer (engine models 2.1).
import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readModel } from '@/lib/diag/read-model'
import { answerTo } from '../../scripts/diag'

type Any = Record<string, unknown>
const sample = (name: string) =>
  JSON.parse(readFileSync(new URL(`./samples/${name}`, import.meta.url), 'utf8')) as Any
const SINGLE = sample('strategy-imperfect-1.json')
const NOISY = sample('noisyor-1.json')

/** Every place in a document, as a path. */
function placesIn(value: unknown, path: string[] = []): string[][] {
  if (typeof value !== 'object' || value === null) return [path]
  return [path, ...Object.entries(value).flatMap(([key, inner]) => placesIn(inner, [...path, key]))]
}
function put(document: Any, path: readonly string[], value: unknown): Any {
  const copy = structuredClone(document)
  let at: Any = copy
  for (const key of path.slice(0, -1)) at = at[key] as Any
  at[path.at(-1)!] = value
  return copy
}
const withoutAnswer = ({ answer: _, ...rest }: Any): Any => rest

describe.each([
  ['single', withoutAnswer(SINGLE)],
  ['noisyor', withoutAnswer(NOISY)],
])('[E6] a file of kind %s with one thing in it changed', (_kind, good) => {
  const places = placesIn(good).filter((path) => path.length > 0)
  const values = fc.constantFrom<unknown>(
    null,
    -1,
    2,
    1e308,
    -1e308,
    '',
    'constructor',
    '__proto__',
    'x'.repeat(5000),
    [],
    {},
    true,
    0,
    1,
  )
  it('[E6] is answered with numbers, or with one sentence that names a field', () => {
    let refused = 0
    fc.assert(
      fc.property(fc.constantFrom(...places), values, (path, value) => {
        const answer = answerTo(JSON.stringify(put(good, path, value)))
        if (answer.ok) {
          // A number that is none would be printed as null; an outcome that leads nowhere is one.
          expect(answer.text.replaceAll('"next": null', '')).not.toContain('null')
          return
        }
        refused++
        expect(answer.text).toMatch(/^"[^"]+" .*\.$/s)
        expect(answer.text.length).toBeLessThan(400)
      }),
      { seed: 61, numRuns: 250 },
    )
    expect(refused).toBeGreaterThan(100)
  }, 120_000)
})

describe('[E6] files', () => {
  const noisy = (over: Any): string =>
    JSON.stringify({
      kind: 'noisyor',
      condition: 'atLeastOne',
      faults: [
        { id: 'a', prior: 0.1 },
        { id: 'constructor', prior: 0.2 },
      ],
      findings: [{ id: 'valueOf', leak: 0.1, links: { constructor: 0.7 } }],
      evidence: { valueOf: 1 },
      ...over,
    })
  it('[E6] names that every object answers to are names like any other', () => {
    const { marginals } = JSON.parse(answerTo(noisy({})).text) as {
      marginals: Record<string, number>
    }
    const seen = { a: 1 - 0.9, c: 1 - 0.9 * 0.3 }
    const weights = [0.1 * 0.8 * seen.a, 0.9 * 0.2 * seen.c, 0.1 * 0.2 * seen.c]
    const total = weights.reduce((x, y) => x + y, 0)
    expect(marginals.constructor).toBeCloseTo((weights[1]! + weights[2]!) / total, 12)
    expect(marginals.a).toBeCloseTo((weights[0]! + weights[2]!) / total, 12)
  })
  it('[E6] the one that no record can hold is refused, as a key and as an id', () => {
    expect(answerTo(noisy({}).replace('"a"', '"__proto__"')).text).toBe(
      '"faults.0.id" cannot be used as a name.',
    )
    expect(answerTo('{"kind":"noisyor","evidence":{"__proto__":1}}').text).toBe(
      '"evidence.__proto__" cannot be used as a name.',
    )
  })
  it.each([
    [
      'an evidence that cannot be',
      noisy({ findings: [{ id: 'valueOf', leak: 0, links: {} }] }),
      /^"evidence" cannot come about/,
    ],
    ['no faults', noisy({ faults: [] }), /^"faults" must have 1 or more in it\.$/],
    [
      'a fault twice',
      noisy({
        faults: [
          { id: 'a', prior: 0.1 },
          { id: 'a', prior: 0.2 },
        ],
      }),
      /^"faults.a" stands there twice\.$/,
    ],
    [
      'a chance above 1',
      noisy({ faults: [{ id: 'a', prior: 1.1 }] }),
      /^"faults.0.prior" must be at most 1\.$/,
    ],
    [
      'more than any number',
      noisy({}).replace('0.1', '1e999'),
      /^"faults.0.prior" must be a number\.$/,
    ],
    [
      'virtual evidence of nothing',
      noisy({ evidence: { valueOf: { virtual: [0, 0] } } }),
      /^"evidence" cannot come about/,
    ],
  ])('[E6] %s', (_, text, sentence) => {
    expect(answerTo(text)).toMatchObject({ ok: false, text: expect.stringMatching(sentence) })
  })
  it('[E6] zero priors, priors of 1 and one suspect are answered', () => {
    const certain = [
      { id: 'a', prior: 1 },
      { id: 'constructor', prior: 0 },
    ]
    const { marginals } = JSON.parse(answerTo(noisy({ faults: certain })).text) as {
      marginals: Record<string, number>
    }
    expect({ ...marginals }).toEqual({ a: 1, constructor: 0 })
    const one = {
      kind: 'single',
      ratePerMinute: 1,
      checks: [],
      faults: [{ id: 'a', prior: 3, repair: null }],
      stops: [{ id: 'tow', cost: 5 }],
    }
    expect(JSON.parse(answerTo(JSON.stringify(one)).text)).toMatchObject({
      posterior: { a: 1 },
      next: { type: 'stop', id: 'tow', expectedCost: 5 },
    })
    expect(answerTo(JSON.stringify({ ...one, stops: [] })).text).toMatch(/^"stops" must hold/)
    expect(
      answerTo(JSON.stringify({ ...one, faults: [{ id: 'a', prior: 0, repair: null }] })).text,
    ).toBe('"faults" must have priors above 0.')
  })
  it('[E6] nested a hundred thousand deep, and a field with an endless name', () => {
    const deep = `${'['.repeat(100_000)}${']'.repeat(100_000)}`
    expect(answerTo(noisy({}).replace('"kind"', `"odd":${deep},"kind"`)).ok).toBe(true)
    const named = answerTo(noisy({ ['y'.repeat(1e6)]: 1 }))
    expect(named.notices[0]!.length).toBeLessThan(200)
  })
  it('[E6] anything at all', () => {
    fc.assert(
      fc.property(fc.anything(), (json) => {
        expect(readModel(json).ok).toBe(false)
      }),
      { seed: 62, numRuns: 500 },
    )
  })
})
