import { describe, expect, test } from 'vitest'
import { happenedAbout } from '@/components/field/log/happened-about'

const NOW = '2026-11-24T18:40:30.500Z'
const ZONE = 'Etc/GMT+6'

describe('[R8] happened about', () => {
  test.each([
    ['', NOW],
    ['12:40', '2026-11-24T18:40:00.000Z'],
    ['11:30', '2026-11-24T17:30:00.000Z'],
    ['1130', '2026-11-24T17:30:00.000Z'],
    ['9.05', '2026-11-24T15:05:00.000Z'],
    // Later than now on the clock: it was yesterday.
    ['12:41', '2026-11-23T18:41:00.000Z'],
    ['23:59', '2026-11-24T05:59:00.000Z'],
  ])('"%s"', (text, wanted) => {
    expect(happenedAbout(text, NOW, ZONE)).toBe(wanted)
  })

  test.each(['24:00', '11:60', 'noon', '11', '-1:30'])('refuses "%s"', (text) => {
    expect(happenedAbout(text, NOW, ZONE)).toBeNull()
  })

  test('holds across the end of summer time (Europe/Berlin, 25 October 2026, 03:00 to 02:00)', () => {
    const now = '2026-10-25T06:00:00.000Z'
    expect(happenedAbout('01:30', now, 'Europe/Berlin')).toBe('2026-10-24T23:30:00.000Z')
    expect(happenedAbout('03:30', now, 'Europe/Berlin')).toBe('2026-10-25T02:30:00.000Z')
    // 02:30 came twice: the second time once that is past, the first time before.
    expect(happenedAbout('02:30', now, 'Europe/Berlin')).toBe('2026-10-25T01:30:00.000Z')
    const between = '2026-10-25T01:10:00.000Z'
    expect(happenedAbout('02:30', between, 'Europe/Berlin')).toBe('2026-10-25T00:30:00.000Z')
  })

  test('holds across the start of summer time (Europe/Berlin, 29 March 2026, 02:00 to 03:00)', () => {
    const now = '2026-03-29T01:30:00.000Z'
    expect(happenedAbout('01:30', now, 'Europe/Berlin')).toBe('2026-03-29T00:30:00.000Z')
    // There was no 02:30 this night: the one of the night before.
    expect(happenedAbout('02:30', now, 'Europe/Berlin')).toBe('2026-03-28T01:30:00.000Z')
    expect(happenedAbout('04:00', now, 'Europe/Berlin')).toBe('2026-03-28T03:00:00.000Z')
  })
})
