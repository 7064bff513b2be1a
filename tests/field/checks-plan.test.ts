import { describe, expect, it } from 'vitest'
import { whyItLoses } from '@/components/checks/runner-up'
import { meaning } from '@/components/checks/saved-reading'
import { provenanceOf, sourceOf } from '@/components/checks/spec-words'
import { decidesWords } from '@/components/engine/decides'
import type { Answer } from '@/components/engine/work'
import { stripOfBody } from '@/components/reading-strip/verdict'
import { spread } from '@/components/suspects/chance-rail'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { indexBook } from '@/lib/diag/book-index'
import { meterInput } from '@/lib/diag/meter'
import type { Plan } from '@/lib/diag/plan'
import { canDecide, judge } from '@/lib/diag/reading'
import { specOf } from '@/lib/diag/spec-of'
import type { ReadingBody } from '@/lib/model/log-entry'
import { METER } from '@/scripts/demo-shop'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const sheet = DEMO_MODELS[0]?.specSheet ?? null
const setup = { meterId: null, nulled: false, partTempC: 20, meterTempC: 20 }

describe('the worked case of the shared facts, through the screens', () => {
  const check = index.checks.get('coilPrimaryResistance')
  if (check === undefined) throw new Error('the code book has no coilPrimaryResistance')
  const judged = specOf(check, sheet)
  const input = meterInput(METER, setup, { quantity: 'resistance', spec: judged.value })
  if (input === null) throw new Error('the demo meter reads no resistance')

  it('[F4] says before the check that this meter cannot decide this spec', () => {
    const fitness = canDecide(input)
    expect(fitness.decides).toBe(false)
    expect(fitness.wouldDecide.map((way) => [way.way, way.reaches95])).toContainEqual([
      'swap',
      true,
    ])
    expect(fitness.wouldDecide.map((way) => [way.way, way.reaches95])).toContainEqual([
      'nullLeads',
      false,
    ])
  })

  // facts/CHECKS.md 2.3: u = 0.1978 ohm, conformance 0.193 (normal), 0.1623 (exact), parts 0.092 to 1.008 ohm.
  it('[F4] 1.0 ohm is too close to call, 19 of 100, 16 by the exact sum', () => {
    const result = judge({ ...input, value: 1, overRange: false })
    expect(result.standardU).toBeCloseTo(0.1978, 4)
    expect([result.span.low, result.span.high]).toEqual([
      expect.closeTo(0.092, 3),
      expect.closeTo(1.008, 3),
    ])
    const { verdict, estimate, standardU, expandedU, conformance, conformanceExact } = result
    const body = {
      quantity: 'resistance',
      unit: 'ohm',
      asTyped: '1.0',
      overRange: false,
      meterFunction: input.meterFunction,
      spec: input.spec,
      result: verdict && { verdict, estimate, standardU, expandedU, conformance, conformanceExact },
    } as ReadingBody
    const strip = stripOfBody(body)
    expect(strip?.verdict).toBe('tooClose')
    expect(strip === null ? '' : meaning(strip, result, 'ohm')).toBe(
      'Best estimate 0.55 ohm, ±0.40. Chance of being within the spec: 19 of 100 (16 by the exact sum).',
    )
  })

  it('[F3] labels a figure of the spec sheet and one of common practice apart', () => {
    expect(provenanceOf(judged)).toMatch(/^Good: 0\.45 to 0\.55 ohm at 20 °C, spec sheet: /)
    const rest = index.checks.get('batteryRest')
    if (rest === undefined) throw new Error('the code book has no batteryRest')
    expect(sourceOf(specOf(rest, null))).toMatch(/^Common practice: /)
    const empty = { ...rest, reading: rest.reading && { ...rest.reading, fallback: null } }
    expect(sourceOf(specOf(empty, null))).toMatch(/kept without a verdict/)
  })
})

describe('what the plate says', () => {
  const suspect = (fault: string, name: string, chance: number) =>
    ({ fault, name, chance, prior: chance, ruledOutBy: null, why: [] }) as const
  const row = (outcome: string, good: boolean, probability: number, stator: number) => ({
    outcome,
    name: outcome,
    good,
    probability,
    chances: { stator, regulator: 0.9 - stator },
  })
  const answer = (rows: ReturnType<typeof row>[]) =>
    ({
      belief: {
        suspects: [suspect('stator', 'Stator', 0.46), suspect('regulator', 'Regulator', 0.31)],
      },
      plan: { next: { type: 'check', id: 'x' }, decides: 'the engine says' },
      outlooks: { 'check:x': rows },
    }) as unknown as Answer & { plan: Plan }

  it('[F5] is one plain sentence per outcome, without a score', () => {
    const two = answer([row('good', true, 0.5, 0.03), row('bad', false, 0.5, 0.95)])
    expect(decidesWords(two, two.plan)).toBe('Good: stator all but cleared. Bad: stator it is.')
  })

  it('[F5] leaves out what hardly happens and names who is first otherwise', () => {
    const three = answer([
      row('Sound', true, 0.6, 0.3),
      row('Doubtful', false, 0.37, 0.5),
      row('Burnt', false, 0.03, 0.99),
    ])
    expect(decidesWords(three, three.plan)).toBe(
      'Sound: regulator first, 60 of 100. Doubtful: stator first, 50 of 100.',
    )
  })

  it('[F5] falls back to the engine for repairs and ways out', () => {
    const none = answer([])
    expect(decidesWords(none, none.plan)).toBe('the engine says')
  })

  it('[F5] says why the runner-up loses, and "equal" when it is equal', () => {
    const plan = { equal: false, differenceMinor: 412.4 } as Plan
    expect(whyItLoses(plan, 'USD')).toMatch(/cost 4\.12 USD more/)
    expect(whyItLoses({ ...plan, equal: true }, 'USD')).toMatch(/equal/)
  })
})

describe('marks on a rail', () => {
  const marks = (...chances: number[]) =>
    chances.map((chance, i) => ({ outcome: `${i}`, words: '', shape: 'ring' as const, chance }))
  const x = (share: number) => share * 358

  it.each([[[0.97, 0.97, 0.98]], [[0, 0.01, 0.02]], [[0.5, 0.5]], [[0.1, 0.9]]])(
    '[R5] %j lie side by side and on the rail',
    (chances) => {
      const placed = spread(marks(...chances), x, 358).map((mark) => mark.x)
      for (const [i, at] of placed.entries()) {
        expect(at).toBeGreaterThanOrEqual(9)
        expect(at).toBeLessThanOrEqual(349)
        if (i > 0) expect(at - (placed[i - 1] ?? 0)).toBeGreaterThanOrEqual(17.99)
      }
    },
  )
})
