import { describe, expect, it } from 'vitest'
import { inKeptUnit, neverNegative, unitOf, unitsOf } from '@/lib/diag/typed-units'
import { QUANTITIES, type Quantity } from '@/lib/model/meter-profile'

describe('units as typed', () => {
  it.each([
    ['resistance', 'kohm', 1.2, 1200],
    ['dcVoltage', 'mV', 450, 0.45],
    // NIST SP 811, appendix B: 1 psi = 6.894757 kPa; 1 in = 25.4 mm exactly.
    ['pressure', 'psi', 43.5, 299.9219422528],
    ['length', 'in', 0.028, 0.7112],
    ['temperature', 'degF', -40, -40],
    ['temperature', 'degF', 212, 100],
  ] as const)('%s in %s: %s is kept as %s', (quantity, id, value, kept) => {
    expect(inKeptUnit(value, unitOf(quantity, id))).toBeCloseTo(kept, 6)
  })

  it('[STD] a kept figure is free of binary noise: 0.3 mV is 0.0003 V', () => {
    expect(inKeptUnit(0.3, unitOf('dcVoltage', 'mV'))).toBe(0.0003)
  })

  it('[F4] the first unit of every quantity is the one it is kept in', () => {
    for (const [quantity, kept] of Object.entries(QUANTITIES))
      expect(unitsOf(quantity as Quantity)[0]).toEqual({ id: kept, factor: 1, offset: 0 })
  })

  it('[F4] only direct volts and amperes and temperatures go under zero', () => {
    const below = (Object.keys(QUANTITIES) as Quantity[]).filter((one) => !neverNegative(one))
    expect(below).toEqual(['dcVoltage', 'dcCurrent', 'temperature'])
  })

  it('[F4] falls back to the kept unit', () => {
    expect(unitOf('resistance', 'bananas').factor).toBe(1)
  })
})
