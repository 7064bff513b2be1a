import { describe, expect, test } from 'vitest'
import { distanceKm, doubtsOf, inDegrees, inMinutes } from '@/components/field/place-doubt'
import { parsePlace } from '@/components/field/place-text'

const GATE_4 = { latitude: 47.1, longitude: -93.2 }

describe('[F1] a typed position', () => {
  test.each([
    ['47.10000, -93.20000', 47.1, -93.2, 'degrees'],
    ['47.1 -93.2', 47.1, -93.2, 'degrees'],
    ['47.1 N 93.2 W', 47.1, -93.2, 'degrees'],
    ['N47.1 W93.2', 47.1, -93.2, 'degrees'],
    ['n 47.1, w 93.2', 47.1, -93.2, 'degrees'],
    ['93.2 W 47.1 N', 47.1, -93.2, 'degrees'],
    ['47,1 N 93,2 W', 47.1, -93.2, 'degrees'],
    ['−33.5; 151.25', -33.5, 151.25, 'degrees'],
    ['47 06.000 N 93 12.000 W', 47.1, -93.2, 'minutes'],
    ['47°06.000′N 93°12.000′W', 47.1, -93.2, 'minutes'],
    ['47 06.0, -93 12.0', 47.1, -93.2, 'minutes'],
    ['47°06′00″N 93°12′00″W', 47.1, -93.2, 'seconds'],
    ['47:06:00 N, 93:12:00 W', 47.1, -93.2, 'seconds'],
    ['0 30 0 S 0 30 0 E', -0.5, 0.5, 'seconds'],
  ])('%s', (text, latitude, longitude, form) => {
    const read = parsePlace(text)
    expect(read.ok).toBe(true)
    if (read.ok) {
      expect(read.value.latitude).toBeCloseTo(latitude, 9)
      expect(read.value.longitude).toBeCloseTo(longitude, 9)
      expect(read.value.form).toBe(form)
    }
  })

  test.each([
    ['', 'empty'],
    ['47.1', 'notTwo'],
    ['47.1 N', 'notTwo'],
    ['47.1 N 93.2', 'notTwo'],
    ['47 06 00 N 93 12 W', 'notTwo'],
    ['near the gate', 'notTwo'],
    ['47.1 N 93.2 N', 'twoOfOneKind'],
    ['-47.1 N 93.2 W', 'notTwo'],
    ['91 N 93.2 W', 'latitudeRange'],
    ['47.1 N 180.1 W', 'longitudeRange'],
    ['47 60.0 N 93 12.0 W', 'minutesRange'],
    ['47.5 06.0 N 93 12.0 W', 'minutesRange'],
  ])('refuses "%s" as %s', (text, kind) => {
    const read = parsePlace(text)
    expect(read.ok ? null : read.problem.kind).toBe(kind)
  })

  test('reads back what it shows', () => {
    for (const point of [GATE_4, { latitude: -0.00001, longitude: 179.99999 }]) {
      const degrees = parsePlace(inDegrees(point))
      const minutes = parsePlace(inMinutes(point))
      expect(degrees.ok && distanceKm(degrees.value, point) < 0.002).toBe(true)
      expect(minutes.ok && distanceKm(minutes.value, point) < 0.002).toBe(true)
    }
    expect(inMinutes(GATE_4)).toBe('47 06.000 N  093 12.000 W')
  })
})

describe('[F1] doubts about it', () => {
  const doubt = (text: string, near: typeof GATE_4 | null) => {
    const read = parsePlace(text)
    return read.ok ? doubtsOf(read.value, near) : []
  }

  test('one degree of the equator is 111.2 km (2 pi 6371.0088 km / 360)', () => {
    const km = distanceKm({ latitude: 0, longitude: 0 }, { latitude: 0, longitude: 1 })
    expect(km).toBeCloseTo(111.195, 2)
  })

  test('[R19] 47.06 93.12 near Gate 4 is 7.5 km off and reads as minutes (scenario S4)', () => {
    const read = parsePlace('47.06 N 93.12 W')
    expect(read.ok && distanceKm(read.value, GATE_4)).toBeCloseTo(7.5, 1)
    const [first] = doubt('47.06 N 93.12 W', GATE_4)
    expect(first?.kind).toBe('readAsMinutes')
    expect(first?.meant?.latitude).toBeCloseTo(47.1, 6)
    expect(first?.meant?.longitude).toBeCloseTo(-93.2, 6)
  })

  test('the other hemisphere and the swapped order are named', () => {
    expect(doubt('47.1 93.2', GATE_4)[0]?.kind).toBe('otherHalf')
    expect(doubt('-12.1 47.2', { latitude: 47.2, longitude: -12.1 })[0]?.kind).toBe('swapped')
  })

  test('a place that fits raises none, a far one is asked about, letters missing are said', () => {
    expect(doubt('47.1003 N 93.2001 W', GATE_4)).toEqual([])
    expect(doubt('40.0 N 93.2 W', GATE_4)[0]?.kind).toBe('far')
    expect(doubt('47.1 93.2', null)[0]?.kind).toBe('noLetters')
    expect(doubt('47.1 N 93.2 W', null)).toEqual([])
  })
})
