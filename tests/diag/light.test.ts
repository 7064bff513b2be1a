import { describe, expect, it } from 'vitest'
import { isDark, lightAt, nightsAround } from '@/lib/diag/light'

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

/** Height of the sun's centre without refraction, degrees: Astronomical Almanac, page C5, low precision (0.01). */
function plainHeight(latitude: number, longitude: number, now: number): number {
  const rad = Math.PI / 180
  const days = now / 86_400_000 - 10_957.5
  const anomaly = (357.528 + 0.9856003 * days) * rad
  const mean = 280.46 + 0.9856474 * days
  const ecliptic = (mean + 1.915 * Math.sin(anomaly) + 0.02 * Math.sin(2 * anomaly)) * rad
  const tilt = (23.439 - 0.0000004 * days) * rad
  const declination = Math.asin(Math.sin(tilt) * Math.sin(ecliptic))
  const right = Math.atan2(Math.cos(tilt) * Math.sin(ecliptic), Math.cos(ecliptic))
  const hour = (280.46061837 + 360.98564736629 * days + longitude) * rad - right
  const north = latitude * rad
  return (
    Math.asin(
      Math.sin(north) * Math.sin(declination) +
        Math.cos(north) * Math.cos(declination) * Math.cos(hour),
    ) / rad
  )
}

describe('light at any latitude, through a leap year', () => {
  it.each([-85, -72, -47, 0, 30, 61, 66, 67.4, 70, 73, 75, 78.2, 80, 84, 87])(
    '[R6] at %d degrees it is dark exactly where the sun stands 6 degrees down, also where days have no dusk',
    (latitude) => {
      for (const longitude of [-180, 15.6, 180])
        for (let hours = 0; hours < 366 * 24; hours += 19) {
          const now = Date.UTC(2028, 0, 1, hours)
          const height = plainHeight(latitude, longitude, now)
          if (Math.abs(height + 6) < 0.25) continue
          const dark = isDark({ latitude, longitude }, now)
          expect([new Date(now).toISOString(), longitude, dark]).toEqual([
            new Date(now).toISOString(),
            longitude,
            height < -6,
          ])
        }
    },
  )

  it('[R6] the first morning after the polar night is dark until its dawn, the last noon light until its dusk', () => {
    // 78.2 N 15.6 E: civil twilight comes back at the end of January and goes in the middle of November.
    const high = { latitude: 78.2, longitude: 15.6 }
    const day = (from: number, step: number) => {
      for (let d = 0; d < 60; d++) {
        const now = from + d * step * 24 * 60 * MINUTE
        if (lightAt(high, now).kind === 'light') return now
      }
      throw new Error('no day')
    }
    const first = day(Date.UTC(2027, 0, 1, 11), 1)
    expect(lightAt(high, first - 6 * 60 * MINUTE).kind).toBe('dark')
    const last = day(Date.UTC(2026, 11, 10, 11), -1)
    const light = lightAt(high, last)
    expect(light).toMatchObject({ kind: 'light', sunset: null })
    if (light.kind !== 'light') throw new Error(light.kind)
    expect(Math.abs(plainHeight(78.2, 15.6, light.dusk) + 6)).toBeLessThan(0.1)
    expect(lightAt(high, light.dusk + MINUTE)).toEqual({ kind: 'never', which: 'rises' })
    expect(isDark(high, light.dusk + MINUTE)).toBe(true)
  })

  it('[R6] near the pole a sun between horizon and civil dusk all day does not rise, and it is not dark', () => {
    const pole = { latitude: 89, longitude: 0 }
    const now = Date.UTC(2028, 2, 12, 12)
    expect(lightAt(pole, now)).toEqual({ kind: 'never', which: 'rises' })
    expect(isDark(pole, now)).toBe(false)
  })

  it('[R6] tells nights with ends only, at most a day long where one end is not known', () => {
    for (let d = 0; d < 366; d++)
      for (const { from, to } of nightsAround(
        { latitude: 78.2, longitude: 15.6 },
        Date.UTC(2028, 0, d, 11),
      ).nights) {
        expect(to - from).toBeGreaterThan(0)
        expect(Number.isFinite(to - from)).toBe(true)
      }
  })

  it('[A1] no place and no instant break an assumption and are not told as night', () => {
    expect(() => lightAt({ latitude: Number.NaN, longitude: 0 }, 0)).toThrow('notAPoint')
    expect(() => isDark({ latitude: 91, longitude: 0 }, 0)).toThrow('notAPoint')
    expect(() => isDark({ latitude: 0, longitude: Number.POSITIVE_INFINITY }, 0)).toThrow(
      'notAPoint',
    )
    expect(() => isDark(GATE, Number.NaN)).toThrow('notAPoint')
  })
})
