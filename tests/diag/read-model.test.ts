import { execFileSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { readModel } from '@/lib/diag/read-model'
import { answerTo } from '../../scripts/diag'

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

describe('[E2.1] model files', () => {
  it('[E2.1] a sample is answered; unknown fields are left alone with a notice', () => {
    const text = JSON.stringify(changed((m) => (m.weather = 'snow')))
    const answer = answerTo(text)
    expect(answer.ok).toBe(true)
    expect(answer.notices).toEqual(['The field "weather" is not known and was left alone.'])
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
  ]
  it.each(bad)('[E2.1] %s: one sentence that names the field', (_, change, sentence) => {
    expect(readModel(changed(change))).toMatchObject({
      ok: false,
      problem: { kind: 'badModel', sentence },
    })
  })
  it('[E2.1] what is no JSON, or no object, is said', () => {
    expect(answerTo('{').text).toMatch(/^The file is not JSON/)
    expect(answerTo('[]').text).toBe('"the file" must be one JSON object.')
  })
  it('[E2.1] the command prints the answer', () => {
    const root = fileURLToPath(new URL('../../', import.meta.url))
    const out = execFileSync(
      'node',
      ['--import', 'tsx', 'scripts/diag.ts', 'tests/diag/samples/strategy-parts-1.json'],
      { cwd: root, encoding: 'utf8' },
    )
    expect((JSON.parse(out) as { next: unknown }).next).toMatchObject({ type: 'check', id: 'c3' })
  }, 60_000)
})
