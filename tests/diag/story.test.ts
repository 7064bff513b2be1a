import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { MOOR_450 } from '@/db/codebook/demo-moor-450'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { explainCode } from '@/lib/diag/code-words'
import { outlook } from '@/lib/diag/outlook'
import { advisePart } from '@/lib/diag/part-choice'
import { nextStep } from '@/lib/diag/plan'
import { judge } from '@/lib/diag/reading'
import { fitnessFor } from '@/lib/diag/verdict-table'
import type { LogBody, ReadingBody } from '@/lib/model/log-entry'
import { code, fixed, log, ohms, pocketMeter, run, swapped } from './fixtures/entries'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const model = MOOR_450
const sheet = model.specSheet!
const spec = sheet.components
  .find((c) => c.id === 'ignitionCoil1')!
  .values.find((v) => v.id === 'primaryResistance')!
const read = (subject: 'suspect' | 'knownGood') =>
  ohms(1.0, { checkId: 'coilPrimaryResistance', spec, subject }) as ReadingBody
const caseAt = (...bodies: LogBody[]) =>
  buildCase({
    index,
    features: model.features,
    spec: sheet,
    job: {
      complaint: {
        words: 'Starts, runs a second or three, dies.',
        symptom: 'startsThenDies',
        lampOn: true,
      },
    },
    entries: log(...bodies),
    meter: pocketMeter,
  })
const suspects = (...bodies: LogBody[]) => belief(caseAt(...bodies)).suspects
const chances = (...bodies: LogBody[]) =>
  Object.fromEntries(suspects(...bodies).map((s) => [s.fault, s.chance]))
const dash = code(1268, 3)
const GROUP = ['ignitionCoilPart', 'ignitionCoilWiring', 'ignitionCoilSupply', 'ignitionCoilDriver']

describe("the main job on the shop's own code book", () => {
  it('[A2] SPN 1268 FMI 3: the coil circuit, a kind, what it supports and argues against, and no part', () => {
    const words = explainCode(index, { format: 'spn', spn: 1268, fmi: 3 }, model.features)
    expect(words.circuitName).toMatch(/ignition coil 1/i)
    expect(words.failure?.name).toMatch(/above normal/)
    expect(words.kindSupports.map((f) => f.fault)).toContain('ignitionCoilPart')
    expect(words.kindArguesAgainst.map((f) => f.fault)).toContain('ignitionCoilSupply')
    expect(words.doesNotProve).toMatch(/names a circuit, not a part/)
  })
  it('[A3] after the code the coil, its wiring, its driver lead; supply and something else stay listed', () => {
    const list = suspects(dash)
    expect(
      list
        .slice(0, 3)
        .map((s) => s.fault)
        .sort(),
    ).toEqual(['ignitionCoilDriver', 'ignitionCoilPart', 'ignitionCoilWiring'])
    expect(list[0]?.fault).toBe('ignitionCoilPart')
    for (const fault of [...GROUP, 'somethingElse'])
      expect(chances(dash)[fault]).toBeGreaterThan(0.01)
    expect(list[0]?.why.find((w) => w.about === 'code')?.logRatio).toBeGreaterThan(1)
  })
  it('[A3] before the code at least 15 gated faults are listed and none stands above 10 of 100', () => {
    const before = suspects()
    expect(before.length).toBeGreaterThan(15)
    expect(before[0]!.chance).toBeLessThan(0.1)
    expect(before.map((s) => s.fault)).not.toContain('jetsBlocked')
  })
  it('[A4] before the check: this meter cannot decide this spec', () => {
    expect(fitnessFor(caseAt(dash), index.checks.get('coilPrimaryResistance')!)).toMatchObject({
      decides: false,
    })
  })
  it('[A4] 1.0 ohm: too close to call, u 0.198, estimate 0.55, chance 0.19 (exact 0.16)', () => {
    const r = judge(read('suspect'))
    expect(r).toMatchObject({
      verdict: 'tooClose',
      estimate: expect.closeTo(0.55, 9),
      standardU: expect.closeTo(0.198, 3),
    })
    expect(r.conformance).toBeCloseTo(0.19, 2)
    expect(r.conformanceExact).toBeCloseTo(0.16, 2)
  })
  it('[A4] after the reading nothing moves by more than 3 of 100', () => {
    const before = chances(dash)
    for (const [fault, p] of Object.entries(chances(dash, read('suspect'))))
      expect(Math.abs(p - before[fault]!)).toBeLessThan(0.03)
  })
  it('[A4] the spare reads the same: the check says nothing about the coil, exactly', () => {
    expect(chances(dash, read('suspect'), read('knownGood'))).toEqual(chances(dash))
    const coil = suspects(dash, read('suspect'), read('knownGood')).find(
      (s) => s.fault === 'ignitionCoilPart',
    )
    expect(coil?.why.filter((w) => w.about === 'reading').every((w) => w.saysNothing)).toBe(true)
  })
  it('[A5] gone, back, gone: the coil stands above 90 of 100', () => {
    const start = [dash, read('suspect'), read('knownGood')]
    const once = chances(...start, swapped('spareFitted', false)).ignitionCoilPart!
    const back = chances(...start, swapped('spareFitted', false), swapped('oldRefitted', true))
      .ignitionCoilPart!
    const done = chances(
      ...start,
      swapped('spareFitted', false),
      swapped('oldRefitted', true),
      swapped('newFitted', false),
    ).ignitionCoilPart!
    expect(once).toBeGreaterThan(0.6)
    expect(once).toBeLessThan(0.9)
    expect(back).toBeGreaterThan(0.9)
    expect(done).toBe(back)
  })
  it('[A6] a clean proof run leaves the coil the cause', () => {
    const bodies = [
      dash,
      swapped('spareFitted', false),
      swapped('oldRefitted', true),
      fixed('ignitionCoilPart'),
    ]
    expect(chances(...bodies, run(12, 0)).ignitionCoilPart).toBeGreaterThan(0.98)
  })
  it('[A5] the plan after the code leads toward the coil circuit and leaves the resistance out with the reason', () => {
    const bag = {
      id: '01980000-0000-7000-8000-000000000501',
      personId: '01980000-0000-7000-8000-000000000101',
      parts: [{ part: 'ignitionCoil', quantity: 1, knownGood: true }],
      tools: ['multimeter', 'lamp', 'screwdriver', 'plugSocket', 'backProbes', 'loadBulb'],
      meterIds: [],
    }
    const shop = { perMinuteMinor: 160, towMinor: 30_000, recoveryMinor: 30_000 }
    const means = {
      bag,
      roles: ['mechanic' as const],
      minutesToLeaveBy: null,
      shop,
      dark: false,
      people: 1 as const,
    }
    const plan = nextStep(caseAt(dash), means)
    expect([
      'coilSwap',
      'coilConnectorLook',
      'coilSupplyDrop',
      'coilControlWire',
      'ignitionCoilPart',
      'ignitionCoilWiring',
    ]).toContain(plan.next.id)
    expect(plan.leftOut.find((l) => l.id === 'coilPrimaryResistance')?.reason).toMatch(
      /^This meter cannot decide/,
    )
    const rows = outlook(caseAt(dash), { kind: 'swap', id: 'coilSwap' })
    expect(rows.find((r) => r.outcome === 'goneAndBack')?.chances.ignitionCoilPart).toBeGreaterThan(
      0.9,
    )
    const proved = nextStep(
      caseAt(dash, swapped('spareFitted', false), swapped('oldRefitted', true)),
      means,
    )
    expect(proved.next).toMatchObject({ type: 'repair', id: 'ignitionCoilPart' })
  })
  it('[A7] genuine 135, aftermarket 25, second recovery 300, genuine fails 2 of 100: break-even 38.7 of 100', () => {
    const figures = {
      genuineMinor: 13_500,
      aftermarketMinor: 2_500,
      recoveryMinor: 30_000,
      genuineFails: 0.02,
    }
    expect(100 * advisePart({ ...figures, aftermarketFails: null }).breakEven).toBeCloseTo(38.7, 1)
    expect(advisePart({ ...figures, aftermarketFails: 0.12 }).advised).toBe('aftermarket')
    expect(advisePart({ ...figures, aftermarketFails: 0.45 }).advised).toBe('genuine')
  })
})
