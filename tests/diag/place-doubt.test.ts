import { describe, expect, test } from 'vitest'
import { distanceMetres } from '@/lib/diag/distance'
import { doubtsOf } from '@/lib/diag/place-doubt'
import { parsePlace } from '@/lib/diag/place-text'

const GATE_4 = { latitude: 47.1, longitude: -93.2 }

describe('doubts about a typed position', () => {
  const doubt = (text: string, near: typeof GATE_4 | null) => {
    const read = parsePlace(text)
    if (!read.ok) throw new Error(read.problem.kind)
    return doubtsOf(read.value, near)
  }

  test('[R19] 47.06 93.12 near Gate 4 is 7.5 km off and reads as minutes (acceptance scenario S4)', () => {
    const read = parsePlace('47.06 N 93.12 W')
    expect(read.ok && distanceMetres(read.value, GATE_4) / 1000).toBeCloseTo(7.5, 1)
    const [first] = doubt('47.06 N 93.12 W', GATE_4)
    expect(first?.kind).toBe('readAsMinutes')
    expect(first?.meant?.latitude).toBeCloseTo(47.1, 6)
    expect(first?.meant?.longitude).toBeCloseTo(-93.2, 6)
    expect(first?.distanceMetres).toBeLessThan(1)
  })

  test('[R19] decimals of 60 and more cannot be minutes', () => {
    expect(doubt('47.60 N 93.12 W', GATE_4)).toEqual([])
  })

  test('[R19] the other hemisphere and the swapped order are named', () => {
    expect(doubt('47.1 93.2', GATE_4)[0]?.kind).toBe('otherHalf')
    expect(doubt('-12.1 47.2', { latitude: 47.2, longitude: -12.1 })[0]?.kind).toBe('swapped')
  })

  // A degree of latitude is 110.574 km at the equator: 0.0091 degrees are 1006 m, 0.0088 are 973 m.
  test('[R19] another reading must lie nearer by more than 1 km', () => {
    const near = { latitude: 0.0091 / 2, longitude: 20 }
    const nearer = { latitude: 0.0088 / 2, longitude: 20 }
    expect(doubt(`${near.latitude} S 20 E`, near)[0]?.kind).toBe('otherHalf')
    expect(doubt(`${nearer.latitude} S 20 E`, nearer)).toEqual([])
  })

  test('[F1] a place that fits raises none; a far one is asked about from 150 km on', () => {
    expect(doubt('47.1003 N 93.2001 W', GATE_4)).toEqual([])
    expect(doubt('40.0 N 93.2 W', GATE_4)).toMatchObject([{ kind: 'far', meant: null }])
    // 1.34 degrees of latitude are 149.0 km there, 1.36 are 151.2 km (111.18 km a degree at 46.4 N).
    expect(doubt('45.76 N 93.2 W', GATE_4)).toEqual([])
    expect(doubt('45.74 N 93.2 W', GATE_4)[0]?.kind).toBe('far')
  })

  test('[F1] letters missing are said only when there is nothing to compare with', () => {
    expect(doubt('47.1 93.2', null)).toEqual([
      { kind: 'noLetters', meant: null, distanceMetres: null },
    ])
    expect(doubt('47.1 -93.2', null)).toEqual([])
    expect(doubt('47.1 N 93.2 W', null)).toEqual([])
  })
})
