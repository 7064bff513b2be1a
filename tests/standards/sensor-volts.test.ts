import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sensorVolts, signalFor } from '@/lib/diag/sensor-volts'
import { theValue } from './the-value'

describe('ratio-metric sensors on 5 V (common practice)', () => {
  const at = (signalVolts: number, supplyVolts = 5) =>
    theValue(sensorVolts({ signalVolts, supplyVolts, supplyU: 0.01 }))
  it('[A4] 0.5 to 4.5 V of 5 V are the sweep; the share counts, not the volts', () => {
    expect(at(0.5)).toMatchObject({
      position: expect.closeTo(0, 9),
      state: 'working',
      supply: 'in',
    })
    expect(at(4.5).position).toBeCloseTo(1, 9)
    expect(at(2.25, 4.5)).toMatchObject({ position: expect.closeTo(0.5, 9), supply: 'outLow' })
  })
  it('[A4] at either rail, below and above the sweep', () => {
    expect([0.1, 0.45, 4.6, 4.95].map((v) => at(v).state)).toEqual([
      'atGround',
      'belowSweep',
      'aboveSweep',
      'atSupply',
    ])
  })
  it('[A4] a sweep that goes to a rail works there; what lies past its ends does not', () => {
    const state = (signalVolts: number) =>
      theValue(
        sensorVolts({ signalVolts, supplyVolts: 5, supplyU: 0 }, { lowShare: 0, highShare: 0.98 }),
      ).state
    expect([0, 0.1, 4.9, 4.99].map(state)).toEqual(['working', 'working', 'working', 'atSupply'])
  })
  it('[A1] a sweep that cannot be is named, there and back', () => {
    const sweep = { lowShare: 0.9, highShare: 0.1 }
    const read = { signalVolts: 1, supplyVolts: 5, supplyU: 0 }
    expect(sensorVolts(read, sweep)).toMatchObject({ problem: { field: 'highShare' } })
    expect(signalFor(0.5, 5, sweep)).toMatchObject({ problem: { field: 'highShare' } })
    expect(signalFor(0.5, 5, { lowShare: Number.NaN, highShare: 1 })).toMatchObject({
      problem: { field: 'lowShare' },
    })
  })
  it('[A4] there and back at any supply', () => {
    const some = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(some, fc.double({ min: 4, max: 6, noNaN: true }), (position, supply) => {
        expect(at(theValue(signalFor(position, supply)), supply)).toMatchObject({
          position: expect.closeTo(position, 9),
          state: 'working',
        })
      }),
      { seed: 62 },
    )
    expect(sensorVolts({ signalVolts: 1, supplyVolts: 0, supplyU: 0 })).toMatchObject({
      problem: { field: 'supplyVolts' },
    })
  })
})
