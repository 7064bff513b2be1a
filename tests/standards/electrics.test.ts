import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  flowPerMinute,
  judgePractice,
  milliohmsOf,
  PRACTICE_LIMITS,
  type PracticeLimit,
  pressureHold,
  sinePeak,
} from '@/lib/diag/practice-limits'
import { crankingLimit, judgeCharging, judgeCranking } from '@/lib/diag/start-and-charge'
import { judgeStator, legBalance } from '@/lib/diag/stator'
import { gaugeFor, type Run, wireDrop } from '@/lib/diag/wire-drop'
import { theValue } from './the-value'

/** Each limit of CHECKS 2.6, 2.7 and 2.9: a figure just inside and one just outside it, on each side it has. */
const EDGES: [PracticeLimit, number | null, number | null][] = [
  ['groundDrop', null, 0.1],
  ['contactDrop', null, 0.2],
  ['lightingDrop', null, 0.3],
  ['starterDrop', null, 0.5],
  ['sensorGroundDrop', null, 0.05],
  ['fiveVoltSupply', 4.9, 5.1],
  ['coilPrimary', 0.2, 5],
  ['coilSecondary', 3000, 20_000],
  ['plugCap', 5000, 10_000],
  ['capacitorIgnition', 100, 400],
  ['pickupPeak', 0.5, 10],
  ['statorLeg', 0.1, 1],
  ['statorPerThousand', 15, 25],
  ['fuelRail', 250, 400],
  ['pulsePump', 10, 30],
  ['fuelFlow', 0.5, null],
  ['drainSmall', null, 5],
  ['drainCar', null, 50],
]

describe('limits of the trade (common practice, no source)', () => {
  it('[A4] every limit of the table stands in this test', () => {
    expect(EDGES.map(([name]) => name).sort()).toEqual(Object.keys(PRACTICE_LIMITS).sort())
  })
  it.each(EDGES)('[STD] %s: from %f to %f, both sides of each', (name, low, high) => {
    const at = (figure: number, u = 0) => theValue(judgePractice(name, figure, u))
    if (low !== null) {
      expect([at(low), at(0.999 * low)]).toEqual(['in', 'outLow'])
      expect(at(0.999 * low, 0.01 * low)).toBe('tooClose')
    }
    if (high !== null) {
      expect([at(high), at(1.001 * high)]).toEqual(['in', 'outHigh'])
      expect(at(1.001 * high, 0.01 * high)).toBe('tooClose')
    }
  })
  it('[STD] 0.2 V at 10 A are 20 milliohms (CHECKS 2.7)', () => {
    expect(theValue(milliohmsOf(0.2, 10))).toBeCloseTo(20, 12)
    expect(milliohmsOf(0.2, 0)).toMatchObject({ problem: { field: 'amperes' } })
  })
  it('[STD] 10.0 V rms of a sine peak at 14.14 V (CHECKS 2.9)', () => {
    expect(theValue(sinePeak(10))).toBeCloseTo(14.14, 2)
  })
  it('[STD] 0.125 L in 15 s are 0.5 L a minute (CHECKS 2.9)', () => {
    expect(theValue(flowPerMinute(0.125, 15))).toBe(0.5)
  })
  it('[STD] fuel pressure holds when less than 20 of 100 go in 10 min; a shorter wait proves nothing good', () => {
    expect(theValue(pressureHold(300, 241, 10))).toMatchObject({ held: true })
    expect(theValue(pressureHold(300, 240, 10))).toMatchObject({ held: false, lost: 0.2 })
    expect(theValue(pressureHold(300, 290, 3))).toMatchObject({ held: null })
    expect(theValue(pressureHold(300, 200, 3))).toMatchObject({ held: false })
    expect(theValue(pressureHold(300, 200, 60))).toMatchObject({ held: null })
    expect(pressureHold(300, 301, 10)).toMatchObject({
      problem: { kind: 'above', field: 'afterKpa' },
    })
  })
  it('[STD] 250 to 400 kPa are 36 to 58 psi (NIST SP 811: 6.894757 kPa each)', () => {
    expect([250, 400].map((kpa) => Math.round(kpa / 6.894757))).toEqual([36, 58])
  })
})

describe('voltage drop along a wire (ASTM B258, IEC 60028)', () => {
  const run: Run = {
    oneWayMetres: 3,
    amperes: 10,
    celsius: 20,
    stranded: false,
    returnsByFrame: false,
  }
  it('[STD] 10 A through 2 x 3 m of gauge 16: 0.790 V', () => {
    expect(theValue(wireDrop(16, run)).volts).toBeCloseTo(0.79, 3)
  })
  it('[STD] stranded gauge 14 is 2.624 and gauge 18 6.636 ohm per 1,000 ft (seen): within the 4 of 100 taken', () => {
    const thousandFeet = { ...run, oneWayMetres: 304.8, stranded: true, returnsByFrame: true }
    for (const [gauge, ohm] of [
      [14, 2.624],
      [18, 6.636],
    ] as const) {
      const got = theValue(wireDrop(gauge, thousandFeet)).ohm
      expect(got).toBeGreaterThanOrEqual(ohm)
      expect(got / ohm).toBeLessThan(1.02)
    }
  })
  it('[A4] a hot wire loses more, a return by the frame half', () => {
    const plain = theValue(wireDrop(16, run)).volts
    expect(theValue(wireDrop(16, { ...run, celsius: 80 })).volts / plain).toBeCloseTo(1.2358, 4)
    expect(theValue(wireDrop(16, { ...run, returnsByFrame: true })).volts).toBeCloseTo(
      plain / 2,
      12,
    )
  })
  it('[A4] the gauge for a loss loses no more, and the next thinner one does', () => {
    const volts = fc.double({ min: 0.05, max: 2, noNaN: true })
    fc.assert(
      fc.property(volts, fc.double({ min: 0.5, max: 20, noNaN: true }), (most, amperes) => {
        const here = { ...run, amperes, stranded: true }
        const gauge = theValue(gaugeFor(here, most))
        if (gauge === null) {
          expect(theValue(wireDrop(4, here)).volts).toBeGreaterThan(most)
          return
        }
        expect(theValue(wireDrop(gauge, here)).volts).toBeLessThanOrEqual(most)
        if (gauge < 22) expect(theValue(wireDrop(gauge + 2, here)).volts).toBeGreaterThan(most)
      }),
      { seed: 61 },
    )
    expect(wireDrop(16, { ...run, amperes: Number.NaN })).toMatchObject({
      problem: { field: 'amperes' },
    })
  })
})

describe('cranking and charging (common practice, CHECKS 2.6)', () => {
  it('[STD] 9.6 V at 21 C, 9.1 V at -10 C, straight between and held beyond', () => {
    const at = [21, -10, 5.5, 40, -40].map((t) => theValue(crankingLimit(t)))
    expect(at).toEqual([9.6, 9.1, 9.35, 9.6, 9.1].map((v) => expect.closeTo(v, 9)))
  })
  it('[A4] 9.4 V while cranking is low when warm, holds in the cold, too close between', () => {
    const at = (airTempC: number, expandedU = 0.05) =>
      theValue(judgeCranking({ volts: 9.4, expandedU }, airTempC))
    expect(at(21).verdict).toBe('low')
    expect(at(-10)).toMatchObject({ verdict: 'holds', outside: false })
    expect(at(8).verdict).toBe('tooClose')
    expect(at(-20)).toMatchObject({ limitVolts: 9.1, outside: true })
  })
  it.each([
    [12.99, 'notCharging'],
    [13.0, 'weak'],
    [13.49, 'weak'],
    [13.5, 'charging'],
    [14.8, 'charging'],
    [14.81, 'high'],
    [15.0, 'high'],
    [15.01, 'regulator'],
  ])('[STD] %f V at 3,000 rpm: %s', (volts, verdict) => {
    const at = { engineRpm: 3000, airTempC: 10 }
    expect(theValue(judgeCharging({ volts, expandedU: 0 }, at)).verdict).toBe(verdict)
  })
  it('[A4] a low reading under 3,000 rpm says nothing, a high one does; the cold may explain a high one', () => {
    const slow = { engineRpm: 2900, airTempC: -15 }
    expect(theValue(judgeCharging({ volts: 12.6, expandedU: 0 }, slow)).verdict).toBe('tooSlow')
    expect(theValue(judgeCharging({ volts: 15.5, expandedU: 0 }, slow)).verdict).toBe('regulator')
    expect(theValue(judgeCharging({ volts: 14.9, expandedU: 0 }, slow))).toEqual({
      verdict: 'high',
      coldExplains: true,
    })
    // 14.9 +-0.3 V is good or high, never low: that stands at any speed. 13.6 +-0.3 V may be low.
    const tooClose = (volts: number) =>
      theValue(judgeCharging({ volts, expandedU: 0.3 }, slow)).verdict
    expect([tooClose(14.9), tooClose(13.6)]).toEqual(['tooClose', 'tooSlow'])
    const fast = { engineRpm: 3500, airTempC: 10 }
    expect(theValue(judgeCharging({ volts: 13.5, expandedU: 0.1 }, fast)).verdict).toBe('tooClose')
    expect(judgeCharging({ volts: 21, expandedU: 0 }, fast)).toMatchObject({
      problem: { field: 'volts' },
    })
  })
})

describe('stator', () => {
  const legs = (figures: number[], expandedU = 0) =>
    figures.map((figure) => ({ figure, expandedU }))
  it('[S5] 27.4, 51.8, 52.3 V differ by 48 of 100 against 5; the winding first, the plug not excluded', () => {
    const got = theValue(
      judgeStator({
        legVolts: [
          { figure: 27.4, expandedU: 1.7 },
          { figure: 51.8, expandedU: 3.1 },
          { figure: 52.3, expandedU: 3.1 },
        ],
        engineRpm: 3000,
        groundOhm: null,
      }),
    )
    expect(got.balance.spread).toBeCloseTo(0.476, 3)
    expect(Math.round(100 * got.balance.spread)).toBe(48)
    expect(got).toMatchObject({ balance: { verdict: 'uneven', lowest: 0 }, points: ['oneLeg'] })
    expect(got.doesNotProve).toMatch(/^A burnt plug/)
    // The sound legs: 52.05 V at 3,000 rpm are 17.35 per 1,000.
    expect(got.voltsPerThousand).toBeCloseTo(17.35, 2)
  })
  it('[STD] alike within 5 of 100: both sides of the edge (common practice)', () => {
    expect(theValue(legBalance(legs([95.1, 100, 100])))).toMatchObject({
      verdict: 'even',
      lowest: null,
    })
    expect(theValue(legBalance(legs([94.9, 100, 100])))).toMatchObject({
      verdict: 'uneven',
      lowest: 0,
    })
    expect(theValue(legBalance(legs([94, 100, 100], 2)))).toMatchObject({ verdict: 'tooClose' })
  })
  it('[A4] one doubtful leg is no spread of its own: 100 +-3 beside 100 +-1 are even, +-5 are not', () => {
    // Worst pairs: (103 - 99) / 103 = 0.039; (105 - 99) / 105 = 0.057. Alone the leg would differ by 0.058.
    const with100 = (u: number) =>
      theValue(legBalance([{ figure: 100, expandedU: u }, ...legs([100], 1)])).verdict
    expect([with100(3), with100(5)]).toEqual(['even', 'tooClose'])
  })
  it('[A1] more legs than a stator has are refused', () => {
    expect(legBalance(legs(Array(13).fill(50)))).toMatchObject({ problem: { field: 'legs' } })
  })
  it('[A4] the same in millivolts: a unit changes nothing', () => {
    const spread = (scale: number) =>
      theValue(
        legBalance(
          legs(
            [20, 21, 21.5].map((v) => v * scale),
            0.1 * scale,
          ),
        ),
      )
    expect(spread(1000).spread).toBeCloseTo(spread(1).spread, 12)
    expect(spread(1000).verdict).toBe(spread(1).verdict)
  })
  it('[A4] a leg to ground, all legs weak, all legs sound', () => {
    const at = (volts: number, groundOhm: number | null) =>
      theValue(judgeStator({ legVolts: legs([volts, volts, volts]), engineRpm: 3000, groundOhm }))
        .points
    expect(at(60, 12)).toEqual(['windingToGround'])
    expect(at(30, null)).toEqual(['weakOrSlow'])
    expect(at(60, null)).toEqual(['statorSound'])
    expect(at(60, 5e6)).toEqual(['statorSound'])
  })
  it('[A1] one leg, no volts at all, no engine speed', () => {
    expect(legBalance(legs([5]))).toMatchObject({ problem: { kind: 'tooFewLegs' } })
    expect(legBalance(legs([0, 0]))).toMatchObject({ problem: { kind: 'allNought' } })
    expect(legBalance(legs([5, -1]))).toMatchObject({ problem: { field: 'leg.2' } })
    expect(judgeStator({ legVolts: legs([5, 5]), engineRpm: 0, groundOhm: null })).toMatchObject({
      problem: { field: 'engineRpm' },
    })
  })
})
