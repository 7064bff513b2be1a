import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { type Means, nextStep } from '@/lib/diag/plan'
import { LUMP, planModel } from '@/lib/diag/plan-model'
import { nextAction } from '@/lib/diag/troubleshoot'
import type { CheckItem } from '@/lib/model/code-book'
import type { LogBody } from '@/lib/model/log-entry'
import {
  caseOf,
  checked,
  code,
  couldNot,
  fixed,
  log,
  ohms,
  pocketMeter,
  run,
  swapped,
} from './fixtures/entries'
import { check, SMALL_ITEMS } from './fixtures/small-book'

const bag: NonNullable<Means['bag']> = {
  id: '01980000-0000-7000-8000-000000000501',
  personId: '01980000-0000-7000-8000-000000000101',
  parts: [{ part: 'coilPart', quantity: 1, knownGood: true }],
  tools: ['jar', 'multimeter'],
  meterIds: [],
}
const means = (over: Partial<Means> = {}): Means => ({
  bag,
  roles: ['mechanic'],
  minutesToLeaveBy: null,
  shop: { perMinuteMinor: 160, towMinor: 30_000, recoveryMinor: 30_000 },
  dark: false,
  people: 2,
  ...over,
})
const at = (...bodies: LogBody[]) => caseOf(log(...bodies), { meter: pocketMeter })
const plan = (bodies: LogBody[], over: Partial<Means> = {}) => nextStep(at(...bodies), means(over))
const reason = (p: ReturnType<typeof nextStep>, id: string) =>
  p.leftOut.find((l) => l.id === id)?.reason

describe('[R5] from belief to the single model', () => {
  const built = planModel(at(code(1268, 3)), means())
  it('[R5] P(only this one) for each suspect and one lump that no repair mends; they sum to 1', () => {
    const sum = built.model.faults.reduce((total, f) => total + f.prior, 0)
    expect(sum).toBeCloseTo(1, 10)
    expect(built.model.faults.map((f) => f.id)).toEqual(['coil', 'wire', 'driver', 'filter', LUMP])
    expect(built.model.faults.at(-1)).toMatchObject({ id: LUMP, repair: null })
    const { last } = built.reckoning
    const lump = last.twoOrMore + last.only.at(-1)!
    expect(built.model.faults.at(-1)?.prior).toBeCloseTo(lump, 10)
  })
  it("[R5] rows are the book's for single faults; the lump's keep the chance of each outcome", () => {
    for (const c of built.model.checks) {
      for (const row of Object.values(c.p)) expect(row.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 9)
      const outcomes = built.outlooks.get(c.id === 'coilSwap' ? 'swap:coilSwap' : `check:${c.id}`)!
      outcomes.forEach((o, k) => {
        const p = built.model.faults.reduce((sum, f) => sum + f.prior * (c.p[f.id]?.[k] ?? 0), 0)
        expect(p).toBeCloseTo(o.probability, 9)
      })
    }
  })
  it('[R5] a result rebuilds the model, a failed repair drops out of it', () => {
    const failed = planModel(at(code(1268, 3), fixed('wire'), run(3, 2)), means())
    expect(failed.model.faults.find((f) => f.id === 'wire')).toMatchObject({ repair: null })
    expect(failed.model.faults.find((f) => f.id === 'wire')!.prior).toBeLessThan(
      built.model.faults.find((f) => f.id === 'wire')!.prior,
    )
  })
})

describe('[F5] the plan', () => {
  it('[F5] names the step the search finds, with runner-up, difference and what it decides', () => {
    const built = planModel(at(code(1268, 3)), means())
    const want = nextAction(built.model, built.state)
    const got = plan([code(1268, 3)])
    expect(got.next.id).toBe(want.id)
    expect(got.next.expectedCostMinor).toBeCloseTo(want.expectedCost, 6)
    expect(got.gap).toBe(0)
    expect(got.runnerUp?.expectedCostMinor).toBeCloseTo(want.runnerUp!.expectedCost, 6)
    expect(got.differenceMinor).toBeCloseTo(
      got.runnerUp!.expectedCostMinor - got.next.expectedCostMinor,
      9,
    )
    expect(got.equal).toBe(false)
    expect(got.decides).toMatch(/of 100/)
    expect(plan([code(1268, 3)])).toEqual(got)
  })
  it('[F5] nothing else is promised for less than the step put first', () => {
    const got = plan([code(1268, 3)])
    expect(got.others.length).toBeGreaterThan(3)
    for (const other of got.others)
      expect(other.expectedCostMinor).toBeGreaterThanOrEqual(got.next.expectedCostMinor)
    const costs = got.others.map((o) => o.expectedCostMinor)
    expect(costs).toEqual([...costs].sort((a, b) => a - b))
  })
  it('[F5] once the swap has gone there and back, the repair comes first, with its part on hand', () => {
    const got = plan([code(1268, 3), swapped('spareFitted', false), swapped('oldRefitted', true)])
    expect(got.next).toMatchObject({
      type: 'repair',
      id: 'coil',
      name: 'Repair: The coil',
      tools: null,
    })
    expect(reason(got, 'coilSwap')).toBe('Done.')
  })
  it('[F7] after a fix it asks for the proof; after a failed one it goes on without it', () => {
    const start = [
      code(1268, 3),
      swapped('spareFitted', false),
      swapped('oldRefitted', true),
      fixed('coil'),
    ]
    expect(plan(start)).toMatchObject({ stage: 'prove', next: { type: 'repair', id: 'coil' } })
    const failed = plan([...start, run(2, 2)])
    expect(failed.stage).toBe('find')
    expect(failed.next.id).not.toBe('coil')
  })
  it('[R5] with notice given it plans one action ahead and still answers', () => {
    const got = plan([code(1268, 3), checked('flow', 'bad'), checked('plug', 'bad')])
    // One action ahead closes no bounds, and says so.
    expect(got.gap).toBeGreaterThan(0)
    expect(got.runnerUp).not.toBeNull()
    expect(got.outcomes.reduce((sum, o) => sum + o.chance, 0)).toBeCloseTo(1, 12)
  })
  it('[E2] equal is said when it is equal', () => {
    const nothing = indexBook({
      version: 1,
      hash: '',
      publishedAt: '',
      items: SMALL_ITEMS.filter((i) => i.kind !== 'check' && i.kind !== 'swap'),
    })
    const got = nextStep(caseOf([], { index: nothing }), means({ roles: ['guide'] }))
    expect([got.next.id, got.runnerUp?.id]).toEqual(['tow', 'returnLater'])
    expect(got).toMatchObject({ equal: true, differenceMinor: 0 })
  })
})

describe('[E2] what is left out, and why', () => {
  it('[F4] a reading this meter cannot decide, and a check that says nothing, are not put first but can be picked', () => {
    const got = plan([code(1268, 3)])
    expect(reason(got, 'coilOhms')).toMatch(/^This meter cannot decide this spec/)
    const silent = check('silent', { coil: [94.7, 5.3] })
    const index = indexBook({
      version: 1,
      hash: '',
      publishedAt: '',
      items: [...SMALL_ITEMS, silent],
    })
    const other = nextStep(caseOf(log(code(1268, 3)), { index }), means())
    expect(reason(other, 'silent')).toMatch(/^Says nothing here/)
  })
  it('[E2] tools, parts, people, light and role', () => {
    const bare = { ...bag, parts: [], tools: [] }
    const got = plan([code(1268, 3)], { bag: bare, people: 1, dark: true })
    expect(reason(got, 'flow')).toBe('Not in the bag: clear jar.')
    expect(reason(got, 'coilSwap')).toBe('No coil in the bag.')
    expect(reason(got, 'coil')).toBe('No coil in the bag.')
    expect(reason(got, 'spark')).toBe('Needs two people.')
    expect(reason(plan([code(1268, 3)], { dark: true }), 'spark')).toBe('Needs daylight.')
    expect(reason(plan([code(1268, 3)], { roles: ['guide'] }), 'module')).toBe('For mechanic only.')
    const unproved = { ...bag, parts: [{ part: 'coilPart', quantity: 1, knownGood: false }] }
    expect(reason(plan([code(1268, 3)], { bag: unproved }), 'coilSwap')).toBe(
      'The coil in the bag is not known to be good.',
    )
    expect(plan([code(1268, 3)], { bag: null }).leftOut.some((l) => /bag/.test(l.reason))).toBe(
      false,
    )
  })
  it('[S1] what could not be done is not offered again; what was done is done', () => {
    const got = plan([code(1268, 3), couldNot('plug'), checked('flow', 'good'), ohms(1.0)])
    expect(reason(got, 'plug')).toBe('Could not be done: bolt frozen')
    expect(reason(got, 'flow')).toBe('Done.')
    expect(reason(got, 'coilOhms')).toBe('Done.')
    const all = [got.next, got.runnerUp, ...got.others].map((a) => a?.id)
    for (const id of ['plug', 'flow', 'coilOhms']) expect(all).not.toContain(id)
  })
  it('[R6] what does not fit before the leave-by time is listed with minutes over; a way out always is there', () => {
    const late = plan([code(1268, 3)], { minutesToLeaveBy: 5 })
    expect(reason(late, 'flow')).toBe('1 min over the leave-by time.')
    expect(reason(late, 'coilSwap')).toBe('7 min over the leave-by time.')
    expect(late.leftOut.find((l) => l.id === 'coilSwap')?.kind).toBe('swap')
    // 4 min and 3 min for the panel: it is not planned, so it is listed.
    expect(reason(late, 'module')).toBe('2 min over the leave-by time.')
    expect([late.next, late.runnerUp, ...late.others].map((a) => a?.id)).not.toContain('module')
    const open = plan([checked('module', 'good'), code(1268, 3)], { minutesToLeaveBy: 14 })
    expect(reason(open, 'coil')).toMatch(/^1 min over/) // 10 and the test run of 5: the panel is off
    const past = plan([code(1268, 3)], { minutesToLeaveBy: -20 })
    expect(past.next.type).toBe('stop')
  })
  it('[R6] after dusk minutes grow by 1.3', () => {
    const lit = plan([code(1268, 3)])
    const dark = plan([code(1268, 3)], { dark: true })
    const minutesOf = (p: typeof lit) =>
      [p.next, p.runnerUp, ...p.others].find((a) => a?.id === 'plug')?.minutes
    expect(minutesOf(dark)).toBeCloseTo(1.3 * minutesOf(lit)!, 9)
  })
  it('[R6] below -5 C minutes grow by 1.5 for gloves, in the dark by both; where nobody said it they do not', () => {
    const minutesAt = (over: Partial<Means>) => {
      const p = plan([code(1268, 3)], over)
      return [p.next, p.runnerUp, ...p.others].find((a) => a?.id === 'plug')?.minutes ?? 0
    }
    const lit = minutesAt({})
    expect([-5, -5.1, -15].map((airTempC) => minutesAt({ airTempC }) / lit)).toEqual(
      [1, 1.5, 1.5].map((x) => expect.closeTo(x, 9)),
    )
    expect(minutesAt({ airTempC: null })).toBe(lit)
    expect(minutesAt({ airTempC: -15, dark: true }) / lit).toBeCloseTo(1.95, 9)
  })
  it('[R10] limping out is refused while the cause is not known, and when the fault is not one to ride on', () => {
    expect(reason(plan([code(1268, 3)]), 'limpOut')).toMatch(/cause is not known/)
    const proved = [code(1268, 3), swapped('spareFitted', false), swapped('oldRefitted', true)]
    expect(reason(plan(proved), 'limpOut')).toBe('Not a fault to ride out on.')
  })
  describe('[R10] with the cause as good as proved and a fault the book lists as one to ride on', () => {
    const weak: LogBody = { kind: 'symptom', symptom: 'weak', conditions: [], words: null }
    const bodies = [checked('flow', 'bad'), checked('spark', 'fine'), checked('plug', 'good'), weak]
    const reading: NonNullable<CheckItem['reading']> = {
      quantity: 'dcVoltage',
      component: 'battery',
      value: 'restVolts',
      fallback: null,
      good: [],
      byFault: {},
    }
    const batteryCheck = check('restingBattery', {}, { reading })
    const index = indexBook({
      version: 1,
      hash: '',
      publishedAt: '',
      items: [...SMALL_ITEMS, batteryCheck],
    })
    const rest = (asTyped: string) =>
      ohms(Number(asTyped), {
        checkId: 'restingBattery',
        quantity: 'dcVoltage',
        unit: 'V',
        asTyped,
        spec: null,
      })
    const planOf = (...more: LogBody[]) =>
      nextStep(caseOf(log(...bodies, ...more), { index, meter: pocketMeter }), means())
    const actions = (p: ReturnType<typeof nextStep>) =>
      [p.next, p.runnerUp, ...p.others].map((a) => a?.id)

    it('[R10] it is never advised, as nobody was asked yet what forbids it', () => {
      const at90 = belief(at(...bodies)).suspects[0]!
      expect(at90).toMatchObject({ fault: 'filter' })
      expect(at90.chance).toBeGreaterThan(0.9)
      expect(actions(planOf())).not.toContain('limpOut')
      expect(reason(planOf(), 'limpOut')).toMatch(/asks first what forbids it/)
    })
    it('[R10] a battery read at 11.8 V refuses it by name, one at 12.4 V does not', () => {
      const flat = planOf(rest('11.80'))
      expect(reason(flat, 'limpOut')).toBe(
        'Refused: the battery read 11.80 V at rest; 11.9 V and less count as empty.',
      )
      expect(actions(flat)).not.toContain('limpOut')
      expect(reason(planOf(rest('12.40')), 'limpOut')).toMatch(/asks first/)
    })
  })
  it('[R4] a check for other machines is not even listed', () => {
    const two = check('reeds', { coil: [10, 90] }, { gate: { fuelling: ['carburettor'] } })
    const index = indexBook({ version: 1, hash: '', publishedAt: '', items: [...SMALL_ITEMS, two] })
    const got = nextStep(caseOf(log(code(1268, 3)), { index }), means())
    expect([got.next, got.runnerUp, ...got.others, ...got.leftOut].map((a) => a?.id)).not.toContain(
      'reeds',
    )
  })
})
