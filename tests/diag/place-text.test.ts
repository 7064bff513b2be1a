import { describe, expect, test } from 'vitest'
import { distanceMetres } from '@/lib/diag/distance'
import { parsePlace, printDegrees, printMinutes } from '@/lib/diag/place-text'

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
      const degrees = parsePlace(printDegrees(point))
      const minutes = parsePlace(printMinutes(point))
      expect(degrees.ok && distanceMetres(degrees.value, point) < 2).toBe(true)
      expect(minutes.ok && distanceMetres(minutes.value, point) < 2).toBe(true)
    }
    expect(printDegrees(GATE_4)).toBe('47.10000 N  93.20000 W')
    expect(printMinutes(GATE_4)).toBe('47 06.000 N  093 12.000 W')
  })
})
