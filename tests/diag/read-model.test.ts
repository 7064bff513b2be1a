import { execFileSync, spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { jsonBreak } from '@/lib/diag/json-break'
import { readModel } from '@/lib/diag/read-model'
import { answerTo } from '../../scripts/diag'

const root = fileURLToPath(new URL('../../', import.meta.url))
const sample = (name: string) => readFileSync(new URL(`./samples/${name}`, import.meta.url), 'utf8')
type Json = Record<string, unknown> & {
  checks: { p: Record<string, number[]>; setup: string[] }[]
  faults: { prior: unknown }[]
}
const changed = (change: (model: Json) => void): unknown => {
  const model = JSON.parse(sample('strategy-setup-1.json')) as Json
  change(model)
  return model
}

const leftAlone = (...fields: string[]) =>
  fields.map((field) => `The field "${field}" is not known and was left alone.`)

describe('[E2.1] model files', () => {
  it('[E2.1] a sample is answered; unknown fields are left alone with a notice', () => {
    const text = JSON.stringify(changed((m) => (m.weather = 'snow')))
    const answer = answerTo(text)
    expect(answer.ok).toBe(true)
    // The samples name a kind for each check and a label for each set-up.
    expect(answer.notices).toEqual(leftAlone('checks.kind', 'setups.label', 'weather'))
    const { next, posterior } = JSON.parse(answer.text) as {
      next: { id: string; expectedCost: number }
      posterior: Record<string, number>
    }
    expect(next).toMatchObject({ id: 'c1', expectedCost: expect.closeTo(90.43343812921543, 9) })
    expect(Object.values(posterior).reduce((a, b) => a + b, 0)).toBeCloseTo(1, 12)
  })
  it('[E2.1] a state in the file is where it starts', () => {
    const state = { evidence: { c1: 'ok' }, tried: ['f1'], open: ['u1'], elapsed: 12 }
    const model = changed((m) => (m.state = state)) as Json & {
      checks: { id: string; outcomes: string[] }[]
    }
    state.evidence.c1 = model.checks[0]!.outcomes[0]!
    const answer = answerTo(JSON.stringify({ ...model, state }))
    expect(answer.ok).toBe(true)
    expect((JSON.parse(answer.text) as { next: { id: string } }).next.id).not.toBe('f1')
  })
  it('[E2.1] noisy-OR files answer their marginals', () => {
    const { marginals } = JSON.parse(answerTo(sample('noisyor-1.json')).text) as {
      marginals: Record<string, number>
    }
    expect(Object.keys(marginals)).toHaveLength(10)
  })
  const bad: [string, (m: Json) => void, string][] = [
    ['no kind', (m) => (m.kind = 'other'), '"kind" must be "single" or "noisyor".'],
    ['words for a number', (m) => (m.ratePerMinute = 'x'), '"ratePerMinute" must be a number.'],
    [
      'a negative minute',
      (m) => (m.verify = { cost: 0, minutes: -1 }),
      '"verify.minutes" must be at least 0.',
    ],
    [
      'a prior that is missing',
      (m) => (m.faults[1]!.prior = undefined),
      '"faults.1.prior" must be a number.',
    ],
    [
      'a row that does not sum',
      (m) => (m.checks[0]!.p.f2 = [0.5, 0.4]),
      '"checks.c1.p.f2" must sum to 1, not 0.9.',
    ],
    [
      'a row too short',
      (m) => (m.checks[0]!.p.f2 = [1]),
      '"checks.c1.p.f2" must have 2 chances, one per outcome.',
    ],
    ['a row left out', (m) => delete m.checks[0]!.p.f2, '"checks.c1.p.f2" is missing.'],
    [
      'a set-up that is not there',
      (m) => (m.checks[0]!.setup = ['u9']),
      '"checks.c1.setup" names a set-up "u9" that is not listed.',
    ],
    [
      'an outcome that is not there',
      (m) => (m.state = { evidence: { c1: 'maybe' }, tried: [], open: [], elapsed: 0 }),
      '"state.evidence.c1" names an outcome "maybe" that the check has not.',
    ],
    [
      'a repair that is not there',
      (m) => (m.state = { evidence: {}, tried: ['f9'], open: [], elapsed: 0 }),
      '"state.tried" names a repair "f9" that is not listed.',
    ],
    ['no list', (m) => (m.stops = {}), '"stops" must be a list.'],
    ['no object', (m) => (m.verify = 7), '"verify" must be an object.'],
    [
      'words for a wrong pass',
      (m) => (m.verify = { cost: 0, minutes: 1, falsePass: 'x' }),
      '"verify.falsePass" must be a chance from 0 to 1, or one for each fault.',
    ],
    [
      'set-ups that need each other',
      (m) =>
        (m.setups = ['u1', 'u2', 'u3'].map((id, i) => ({
          id,
          minutes: 1,
          requires: [`u${1 + ((i + 1) % 3)}`],
          closedByTest: false,
        }))),
      '"setups.u1.requires" leads back to itself.',
    ],
  ]
  it.each(bad)('[E2.1] %s: one sentence that names the field', (_, change, sentence) => {
    expect(readModel(changed(change))).toMatchObject({
      ok: false,
      problem: { kind: 'badModel', sentence },
    })
  })
  it('[E2.1] evidence that is neither 0 nor 1 is told what it may be', () => {
    const model = JSON.parse(sample('noisyor-1.json')) as { evidence: Record<string, unknown> }
    const evidence = { ...model.evidence, [Object.keys(model.evidence)[0]!]: 2 }
    expect(answerTo(JSON.stringify({ ...model, evidence })).text).toMatch(
      /^"evidence\.\w+" must be 1, 0 or \{ "virtual": \[.*\] \}\.$/,
    )
  })
  it('[E2.1] unknown fields are told at any depth, and of many only the first twenty', () => {
    const deep = changed((m) => {
      Object.assign(m.faults[0]!, { colour: 1, shapes: [2] })
      m.state = { evidence: {}, tried: [], open: [], elapsed: 0, mood: 'good' }
    })
    expect(answerTo(JSON.stringify(deep)).notices).toEqual(
      leftAlone('faults.colour', 'faults.shapes', 'checks.kind', 'setups.label', 'state.mood'),
    )
    const many = changed((m) => {
      for (let i = 0; i < 30; i++) m[`x${i}`] = i
    })
    expect(answerTo(JSON.stringify(many)).notices).toHaveLength(21)
    expect(answerTo(JSON.stringify(many)).notices.at(-1)).toMatch(/^12 more fields/)
  })
  it.each([
    ['', 'it ends at line 1, column 1.'],
    ['{', 'it ends at line 1, column 2.'],
    [
      '{"kind": "single",\n "faults": [{"prior": 0.1}, {"prior": NaN}]}',
      '"NaN" cannot stand at line 2, column 39, in "faults.1.prior".',
    ],
    [
      '{"verify": {"cost": -Infinity}}',
      '"-Infinity" cannot stand at line 1, column 21, in "verify.cost".',
    ],
    ['{"a": [1, 2,]}', '"]" cannot stand at line 1, column 13, in "a.2".'],
    ['{"a": {"b": 1', 'it ends at line 1, column 14, in "a.b".'],
    ['{"a": 01}', '"01" cannot stand at line 1, column 7, in "a".'],
    ["{'a': 1}", '"\'a\':" cannot stand at line 1, column 2.'],
    ['{} {}', '"{" cannot stand at line 1, column 4.'],
  ])('[E2.1] %j is no JSON: where, and in which field', (text, where) => {
    expect(answerTo(text)).toEqual({
      ok: false,
      text: `The file is not JSON: ${where}`,
      notices: [],
    })
  })
  it('[E2.1] a place is named exactly where JSON.parse refuses', () => {
    const letters = fc.constantFrom(...'{}[]:,"\\ \n1-.e0atrufslN')
    const text = fc.oneof(
      fc.array(letters, { maxLength: 24 }).map((list) => list.join('')),
      fc.tuple(fc.json({ maxDepth: 4 }), fc.nat(), letters).map(([json, n, letter]) => {
        const at = n % (json.length + 1)
        return json.slice(0, at) + letter + json.slice(at + (n % 2))
      }),
    )
    fc.assert(
      fc.property(text, (json) => {
        const refused = (): boolean => {
          try {
            JSON.parse(json)
            return false
          } catch {
            return true
          }
        }
        expect(jsonBreak(json) !== null).toBe(refused())
      }),
      { seed: 71, numRuns: 3000 },
    )
  })
  it('[E2.1] what is no object is said', () => {
    for (const text of ['[]', 'null', '3'])
      expect(answerTo(text).text).toBe('"the file" must be one JSON object.')
  })
  it('[E2.1] the command says in one sentence what it cannot read, and ends with 1', () => {
    for (const [file, sentence] of [
      ['tests/diag/samples/none.json', '"tests/diag/samples/none.json" cannot be read as a file.'],
      ['tests/diag', '"tests/diag" cannot be read as a file.'],
      ['biome.json', '"kind" must be "single" or "noisyor".'],
    ] as const) {
      const { status, stdout, stderr } = spawnSync(
        'node',
        ['--import', 'tsx', 'scripts/diag.ts', file],
        { cwd: root, encoding: 'utf8' },
      )
      expect([status, stdout, stderr.trim()]).toEqual([1, '', sentence])
    }
  }, 60_000)
  it('[E2.1] the command prints the answer', () => {
    const out = execFileSync(
      'node',
      ['--import', 'tsx', 'scripts/diag.ts', 'tests/diag/samples/strategy-parts-1.json'],
      { cwd: root, encoding: 'utf8' },
    )
    expect((JSON.parse(out) as { next: unknown }).next).toMatchObject({ type: 'check', id: 'c3' })
  }, 60_000)
})
