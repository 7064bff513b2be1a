import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { likelihood } from '@/lib/diag/evidence-reading'
import { agrees, differenceU } from '@/lib/diag/twin-difference'
import type { LogBody, ReadingBody } from '@/lib/model/log-entry'
import { caseOf, checked, code, log, ohms } from './fixtures/entries'
import { specOf } from './fixtures/readings'

const of = (...bodies: LogBody[]): Record<string, number> =>
  Object.fromEntries(belief(caseOf(log(...bodies))).suspects.map((s) => [s.fault, s.chance]))
const reading = (value: number, over: Partial<ReadingBody> = {}) => ohms(value, over) as ReadingBody
const twin = (value: number, over: Partial<ReadingBody> = {}) =>
  ohms(value, { subject: 'knownGood', ...over })
const fine = { nulled: true, meterFunction: { percent: 0.3, digits: 2, resolution: 0.01 } }

describe('[E1] the density of what was read', () => {
  it('[E1] is the mean of the normal density over the pieces, with the outlier floor (numeric integral)', () => {
    const pieces = [
      { weight: 3, from: 0.9, to: 1.1 },
      { weight: 1, from: 2, to: 4 },
    ]
    const [x, u] = [1.3, 0.4]
    let sum = 0
    for (const { weight, from, to } of pieces)
      for (let i = 0; i < 20_000; i++) {
        const t = from + ((i + 0.5) / 20_000) * (to - from)
        sum += (weight / 4 / 20_000) * Math.exp(-(((x - t) / u) ** 2) / 2)
      }
    const want = 0.98 * (sum / (u * Math.sqrt(2 * Math.PI))) + 0.02 / 20
    const shown = { at: x * 0.5, standardU: u * 0.5, overRange: false }
    expect(likelihood(pieces, shown, 0.5)).toBeCloseTo(want, 7)
  })
  it.each([0, 1e-6, 1e-5, 1e-4])(
    '[E1] a piece %s wide is a point: the normal density about its middle, also far from it',
    (width) => {
      const [from, u] = [0.9, 0.05]
      for (const sigmas of [0, 1, 4, 6]) {
        const middle = from + width / 2
        const at = middle + sigmas * u
        const got = likelihood(
          [{ weight: 2, from, to: from + width }],
          { at, standardU: u, overRange: false },
          1,
        )
        const density = Math.exp(-(sigmas ** 2) / 2) / (u * Math.sqrt(2 * Math.PI))
        expect(got / (0.98 * density + 0.001) - 1).toBeCloseTo(0, 5)
      }
    },
  )
  it('[E1] the whole of all readings has chance 1, floor included', () => {
    const pieces = [{ weight: 1, from: 0.8, to: 1.3 }]
    let sum = 0
    const step = 0.002
    for (let x = -400; x < 400; x += step)
      sum += step * likelihood(pieces, { at: x, standardU: 0.2, overRange: false }, 1)
    expect(sum).toBeCloseTo(1, 2)
  })
  it('[E1] over range is the chance of lying above the top of the range', () => {
    const pieces = [
      { weight: 0.7, from: 0.9, to: 1.1 },
      { weight: 0.3, from: 100, to: 300 },
    ]
    expect(likelihood(pieces, { at: 200, standardU: 1, overRange: true }, 1)).toBeCloseTo(
      0.98 * 0.15 + 0.001,
      12,
    )
  })
})

describe('[E1] readings in the belief', () => {
  const start = code(1268, 3)
  it('[E1] a reading that this meter cannot judge moves little, a plain open much', () => {
    expect(Math.abs(of(start, ohms(1.0)).coil! - of(start).coil!)).toBeLessThan(0.1)
    expect(of(start, ohms(200, { overRange: true })).coil).toBeGreaterThan(0.9)
    expect(of(start, ohms(150)).coil).toBeGreaterThan(0.9)
  })
  it('[E1] no reading sets a suspect to nought', () => {
    for (const value of [0, 0.4, 3, 50, 1e6])
      expect(of(start, ohms(value, fine)).coil).toBeGreaterThan(0.001)
  })
  it('[E1] a fine meter that reads the middle speaks against the coil', () => {
    expect(of(start, ohms(0.5, fine)).coil).toBeLessThan(of(start).coil!)
  })
  it('[R7] a good twin that reads the same, with a meter that cannot decide: it says nothing, exactly', () => {
    expect(of(start, ohms(1.0), twin(1.0))).toEqual(of(start))
    expect(of(start, twin(1.1), ohms(1.0))).toEqual(of(start))
    const why = belief(caseOf(log(start, ohms(1.0), twin(1.0)))).suspects.find(
      (s) => s.fault === 'coil',
    )?.why
    expect(
      why?.filter((w) => w.about === 'reading').map((w) => [w.logRatio, w.saysNothing]),
    ).toEqual([
      [0, true],
      [0, true],
    ])
  })
  it('[R7] a twin that differs clearly: the difference is the evidence, sharper than the reading alone', () => {
    const alone = of(start, ohms(0.7)).coil!
    const against = of(start, ohms(0.7), twin(1.0)).coil!
    expect(against).toBeGreaterThan(alone)
    expect(against).toBeGreaterThan(of(start).coil!)
  })
  it('[R7] with a meter that can decide, agreeing with the twin speaks for the part', () => {
    const agreed = of(start, ohms(0.5, fine), twin(0.5, fine)).coil!
    expect(agreed).toBeLessThan(of(start).coil!)
  })
  it('[R17] the difference sheds what both share: half a step, contact and the gain on it', () => {
    expect(differenceU(reading(1.0), reading(1.0))).toBeCloseTo(0.05, 12)
    expect(agrees(reading(1.0), reading(1.1))).toBe(true)
    expect(agrees(reading(1.0), reading(1.2))).toBe(false)
    const other = reading(1.2, { meterId: '01980000-0000-7000-8000-000000000999' })
    expect(agrees(reading(1.0), other)).toBe(true)
    expect(differenceU(reading(1.0), other)).toBeGreaterThan(0.27)
    expect(agrees(reading(1.0, { overRange: true }), reading(1.0))).toBe(false)
  })
  it('[E1] the reading counts, not also its recorded outcome', () => {
    expect(of(start, ohms(1.4), checked('coilOhms', 'outHigh'))).toEqual(of(start, ohms(1.4)))
    expect(of(start, checked('coilOhms', 'outHigh')).coil).toBeGreaterThan(of(start).coil!)
  })
  it('[E1] without a nominal value the verdict enters as virtual evidence', () => {
    const bare = specOf({ quantity: 'resistance' })
    expect(of(start, ohms(1.0, { spec: bare }))).toEqual(of(start))
    const spec = specOf({ quantity: 'resistance', low: 0.45, high: 0.55, nominal: 0 })
    expect(of(start, ohms(150, { spec })).coil).toBeGreaterThan(of(start).coil!)
  })
})
