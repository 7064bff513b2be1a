import { describe, expect, it } from 'vitest'
import { isDark, lightAt } from '@/lib/diag/light'

/**
 * Gate 4 of the acceptance world: 47.10000 N 93.20000 W, 24 November 2026, UTC-6: sunset 16:29, civil
 * dusk 17:03 (acceptance scenarios, "World for all"). Two minutes are allowed: the scenario rounds.
 */
const GATE = { latitude: 47.1, longitude: -93.2 }
const MINUTE = 60_000
const at = (hour: number, minute = 0, day = 24) => Date.UTC(2026, 10, day, hour + 6, minute)
const near = (ms: number, wanted: number) => expect(Math.abs(ms - wanted)).toBeLessThan(2 * MINUTE)

describe('light at a place', () => {
  it('[R6] counts to civil dusk by day and names the sunset before it', () => {
    const light = lightAt(GATE, at(12))
    if (light.kind !== 'light') throw new Error(light.kind)
    near(light.dusk, at(17, 3))
    near(light.sunset ?? 0, at(16, 29))
    near(at(12) + light.untilMs, at(17, 3))
    expect(isDark(GATE, at(12))).toBe(false)
  })

  it('[R6] is light in the twilight after sunset, dark after civil dusk until civil dawn', () => {
    expect(lightAt(GATE, at(16, 45)).kind).toBe('light')
    for (const time of [at(17, 30), at(23, 59), at(3, 0, 25)]) {
      const light = lightAt(GATE, time)
      if (light.kind !== 'dark') throw new Error(light.kind)
      expect(light.dawn).toBeGreaterThan(time)
      expect(light.dawn - time).toBeLessThan(15 * 60 * MINUTE)
      expect(isDark(GATE, time)).toBe(true)
    }
  })

  it('[R6] says so where the sun does not rise, does not set, or it never gets dark', () => {
    const high = { latitude: 78.2, longitude: 15.6 }
    const middle = { latitude: 62.2, longitude: 25.7 }
    expect(lightAt(high, Date.UTC(2026, 11, 21, 11))).toEqual({ kind: 'never', which: 'rises' })
    expect(isDark(high, Date.UTC(2026, 11, 21, 11))).toBe(true)
    expect(lightAt(high, Date.UTC(2026, 5, 21, 11))).toEqual({ kind: 'never', which: 'sets' })
    expect(lightAt(middle, Date.UTC(2026, 5, 21, 11))).toEqual({ kind: 'never', which: 'darkens' })
    expect(isDark(middle, Date.UTC(2026, 5, 21, 11))).toBe(false)
  })

  it('[R6] turns dark within two minutes of civil dusk, and light again within two of civil dawn', () => {
    const dusk = at(17, 3)
    expect([isDark(GATE, dusk - 2 * MINUTE), isDark(GATE, dusk + 2 * MINUTE)]).toEqual([
      false,
      true,
    ])
    const light = lightAt(GATE, at(23))
    if (light.kind !== 'dark') throw new Error(light.kind)
    expect([isDark(GATE, light.dawn - MINUTE), isDark(GATE, light.dawn)]).toEqual([true, false])
  })
})
