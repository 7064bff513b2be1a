import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import type { Case } from '@/lib/diag/case'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, code, fixed, log, run, swapped } from './fixtures/entries'
import { SMALL_ITEMS } from './fixtures/small-book'

const chances = (c: Case): Record<string, number> =>
  Object.fromEntries(belief(c).suspects.map((s) => [s.fault, s.chance]))
const of = (...bodies: LogBody[]) => chances(caseOf(log(...bodies)))

describe('[E1] codes', () => {
  it('[E1] a code lifts its circuit, by role, and names no part', () => {
    const after = of(code(1268, 3))
    const before = of()
    for (const f of ['coil', 'wire', 'driver']) expect(after[f]).toBeGreaterThan(before[f]!)
    expect(after.filter).toBeLessThan(before.filter!)
    expect(of(code(1268, 5)).wire).toBeGreaterThan(of(code(1268, 5)).coil!)
  })
  it('[E1] a kind that is silent on roles still points to its circuit a little', () => {
    const little = of(code(1268, 31))
    expect(little.coil).toBeGreaterThan(of().coil!)
    expect(little.coil).toBeLessThan(of(code(1268, 3)).coil!)
  })
  it('[E1] a code without a circuit, or not in the book, moves nothing', () => {
    expect(of(code(168, 1))).toEqual(of())
    expect(
      of({
        kind: 'code',
        seen: { format: 'asShown', text: 'E-17' },
        context: { module: null, status: 'active', count: null, order: 1, photo: null },
      }),
    ).toEqual(of())
  })
  it('[E1] a kind that a role never sets, or always, leaves every suspect possible', () => {
    const items = SMALL_ITEMS.map((item) =>
      item.kind === 'failure' && item.id === 'fmi3'
        ? { ...item, byRole: { part: 0, wiring: 100, driver: 30 }, otherwise: 0 }
        : item,
    )
    const index = indexBook({ version: 1, hash: '', publishedAt: '', items })
    const after = chances(caseOf(log(code(1268, 3)), { index }))
    for (const p of Object.values(after)) expect(p).toBeGreaterThan(0)
    expect(after.wire).toBeGreaterThan(after.driver!)
    expect(after.coil).toBeLessThan(after.driver!)
  })
  it('[R11] a stored code says less than an active one', () => {
    expect(of(code(1268, 3, 'stored')).coil).toBeLessThan(of(code(1268, 3)).coil!)
    expect(of(code(1268, 3, 'stored')).coil).toBeGreaterThan(of().coil!)
  })
})

describe('[E1] swaps', () => {
  const start = code(1268, 3)
  it('[S7] gone once is weaker than gone and back; the coil is first after the one, above 90 after the other', () => {
    const once = of(start, swapped('spareFitted', false))
    const back = of(start, swapped('spareFitted', false), swapped('oldRefitted', true))
    expect(Math.max(...Object.values(once))).toBe(once.coil)
    expect(back.coil).toBeGreaterThan(0.9)
    expect(once.coil).toBeLessThan(back.coil!)
  })
  it('[S7] "not done" leaves the chance where it was; the new part repeats and is not counted twice', () => {
    const once = of(start, swapped('spareFitted', false))
    expect(of(start, swapped('spareFitted', false), swapped('oldRefitted', null))).toEqual(once)
    const back = of(start, swapped('spareFitted', false), swapped('oldRefitted', true))
    expect(
      of(
        start,
        swapped('spareFitted', false),
        swapped('oldRefitted', true),
        swapped('newFitted', false),
      ),
    ).toEqual(back)
  })
  it('[E1] gone for good with the old part back speaks for a plug pushed home', () => {
    const home = of(start, swapped('spareFitted', false), swapped('oldRefitted', false))
    expect(home.wire).toBeGreaterThan(home.coil!)
  })
  it('[E1] no change speaks against the part; a new part that does not cure undoes the proof', () => {
    expect(of(start, swapped('spareFitted', true)).coil).toBeLessThan(of(start).coil!)
    const undone = of(
      start,
      swapped('spareFitted', false),
      swapped('oldRefitted', true),
      swapped('newFitted', true),
    )
    expect(undone.coil).toBeLessThan(0.9)
  })
})

describe('[E1] proof runs after a fix', () => {
  const start = [
    code(1268, 3),
    swapped('spareFitted', false),
    swapped('oldRefitted', true),
    fixed('coil'),
  ]
  it('[F7] a clean run speaks for the fixed fault, one with the fault in it against it', () => {
    const before = of(...start)
    expect(of(...start, run(12, 0)).coil).toBeGreaterThan(before.coil!)
    expect(of(...start, run(3, 2)).coil).toBeLessThan(before.coil!)
  })
  it('[F7] runs after the same fix add up and count once; before a fix they say nothing', () => {
    expect(of(...start, run(6, 0), run(6, 0)).coil).toBeCloseTo(of(...start, run(12, 0)).coil!, 12)
    expect(of(code(1268, 3), run(12, 0))).toEqual(of(code(1268, 3)))
  })
  it('[E1] when it comes tells for the faults that come so, once, and the unnamed says nothing', () => {
    const said = (...conditions: string[]): LogBody => ({
      kind: 'symptom',
      symptom: 'stalls',
      conditions,
      words: null,
    })
    const [plain, hot] = [of(), of(said('whenHot'))]
    expect(hot.coil).toBeGreaterThan(plain.coil!)
    expect(hot.filter).toBeLessThan(plain.filter!)
    expect(of(said('always'))).toEqual(plain)
    expect(of(said('whenHot'), said('whenHot', 'always'))).toEqual(hot)
    // Against suspects of 30 and of 10 of 100 the odds of one of 80 grow by between 80 / 30 and 80 / 10.
    const ratio = (b: Record<string, number>) => b.coil! / (1 - b.coil!)
    expect(ratio(hot) / ratio(plain)).toBeGreaterThan(80 / 30)
    expect(ratio(hot) / ratio(plain)).toBeLessThan(80 / 10)
  })
  it('[S7] a cold run does not count for a fault that comes when hot', () => {
    const hot: LogBody = {
      kind: 'symptom',
      symptom: 'stalls',
      conditions: ['whenHot'],
      words: null,
    }
    expect(of(hot, ...start, run(12, 0, false))).toEqual(of(hot, ...start))
    expect(of(hot, ...start, run(12, 0, true)).coil).toBeGreaterThan(of(hot, ...start).coil!)
  })
})
