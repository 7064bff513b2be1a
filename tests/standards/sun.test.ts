import { describe, expect, it } from 'vitest'
import { minutesToLeaveBy, sunBearing, sunHeight, sunTimes, twilights } from '@/lib/diag/daylight'

const MINUTE = 60_000
const HOUR = 60 * MINUTE
const at = (iso: string) => Date.parse(iso)
/** Within a minute of a published minute (CHECKS 3.1); published seconds are met within three. */
const near = (got: number | null, iso: string, ms = MINUTE) => {
  expect(got).not.toBeNull()
  expect(Math.abs((got ?? 0) - at(iso))).toBeLessThan(ms)
}

describe('sunrise and sunset, USNO (seen in a solar-energy library)', () => {
  it.each([
    [39.0, -105.0, -7, '2015-01-02', '07:19', '16:49'],
    [39.0, -105.0, -7, '2015-04-02', '05:43', '18:24'],
    [39.0, -105.0, -7, '2015-08-02', '05:01', '19:10'],
    [39.0, -105.0, -7, '2015-12-02', '07:01', '16:38'],
    [39.917, 116.383, 8, '2015-01-02', '07:36', '17:00'],
    [39.917, 116.383, 8, '2015-04-02', '05:58', '18:39'],
  ])('[STD] %f N %f E, UTC%i, %s: %s and %s', (lat, lon, zone, day, rise, set) => {
    const sun = sunTimes(lat, lon, at(`${day}T12:00:00Z`) - zone * HOUR)
    near(sun.sunrise === null ? null : sun.sunrise + zone * HOUR, `${day}T${rise}:00Z`)
    near(sun.sunset === null ? null : sun.sunset + zone * HOUR, `${day}T${set}:00Z`)
    expect(sun.never).toBeNull()
  })
  it.each([
    [-35, 0, '1996-07-05', '07:08:15', '17:01:04'],
    [35, 0, '1994-01-02', '07:08:12', '16:59:55'],
  ])('[STD] %i N %i E on %s to the second: %s and %s', (lat, lon, day, rise, set) => {
    const sun = sunTimes(lat, lon, at(`${day}T12:00:00Z`))
    near(sun.sunrise, `${day}T${rise}Z`, 3000)
    near(sun.sunset, `${day}T${set}Z`, 3000)
  })
  it.each([
    ['2020-01-15', '2020-01-15T18:57:00Z', '2020-01-15T18:01:00Z'],
    ['2020-03-25', '2020-03-25T15:43:00Z', '2020-03-25T14:59:00Z'],
    ['2020-09-25', '2020-09-25T15:53:00Z', '2020-09-25T15:10:00Z'],
    ['2020-12-15', '2020-12-15T19:10:00Z', '2020-12-15T18:08:00Z'],
  ])('[STD] 61.217 N 149.867 W on %s: rise %s, civil dawn %s', (day, rise, dawn) => {
    const sun = sunTimes(61.216667, -149.866667, at(`${day}T22:00:00Z`))
    near(sun.sunrise, rise)
    near(sun.civilDawn, dawn)
  })
  it('[STD] the sunset that follows the sunrise: 01:21 the next UTC day, not the 01:19 of the evening before', () => {
    near(
      sunTimes(61.216667, -149.866667, at('2020-01-15T22:00:00Z')).sunset,
      '2020-01-16T01:21:00Z',
    )
    near(
      sunTimes(61.216667, -149.866667, at('2020-01-14T22:00:00Z')).sunset,
      '2020-01-15T01:19:00Z',
    )
  })
  it('[STD] sunset listed for 2020-12-15 at 00:40 is the evening of 12-14 there (USNO pairs by UTC date, CHECKS 3.1 trap)', () => {
    near(
      sunTimes(61.216667, -149.866667, at('2020-12-14T22:00:00Z')).sunset,
      '2020-12-15T00:40:00Z',
    )
  })
  it('[STD] SPA example: the set of the local day before is 17:20:18, not that of 10-17 (CHECKS 3.1 trap)', () => {
    const before = sunTimes(39.742476, -105.1786, at('2003-10-16T19:00:00Z'))
    near(before.sunset, '2003-10-17T00:20:18Z', 3000)
  })
  it('[STD] midsummer at 61 N: rise 12:22, set 07:42, civil twilight all night', () => {
    const sun = sunTimes(61.216667, -149.866667, at('2020-06-25T22:00:00Z'))
    near(sun.sunrise, '2020-06-25T12:22:00Z')
    near(sun.sunset, '2020-06-26T07:42:00Z')
    // The table lists by UTC date: 07:42 on 06-25 is the evening of 06-24 there.
    near(
      sunTimes(61.216667, -149.866667, at('2020-06-24T22:00:00Z')).sunset,
      '2020-06-25T07:42:00Z',
    )
    expect(sun).toMatchObject({ civilDusk: null, civilDawn: null, never: 'darkens' })
  })
  it('[STD] 78.2167 N 15.6333 E from 2020-01-05 to 02-05: below the horizon all day (USNO, seen)', () => {
    for (let day = 0; day < 32; day++) {
      const sun = sunTimes(78.2167, 15.6333, at('2020-01-05T12:00:00Z') + day * 24 * HOUR)
      expect(sun).toMatchObject({ sunrise: null, sunset: null, never: 'rises' })
    }
  })
  it('[STD] 78.2 N at midsummer: the sun does not set', () => {
    expect(sunTimes(78.2167, 15.6333, at('2020-06-25T12:00:00Z'))).toMatchObject({
      sunset: null,
      never: 'sets',
    })
  })
  it('[STD] SPA example 2003-10-17: rise 06:12:43, set of the local day 17:18:50 (memory, recomputed)', () => {
    const sun = sunTimes(39.742476, -105.1786, at('2003-10-17T19:00:00Z'))
    near(sun.sunrise, '2003-10-17T13:12:43Z', 3000)
    near(sun.sunset, '2003-10-18T00:18:50Z', 3000)
  })
  it('[STD] SPA example 2003-10-17 12:30:30: azimuth 194.340241, declination -9.31434 degrees (seen)', () => {
    const [lat, lon, noon] = [39.742476, -105.1786, at('2003-10-17T19:30:30Z')]
    const bearing = sunBearing(lat, lon, noon)
    expect(Math.abs(bearing - 194.340241)).toBeLessThan(0.01)
    // Declination from height and bearing, without the refraction of the example (90 - 50.11162 with 0.0163).
    const rad = Math.PI / 180
    const height = (sunHeight(lat, lon, noon) - 0.0163) * rad
    const sine =
      Math.sin(lat * rad) * Math.sin(height) +
      Math.cos(lat * rad) * Math.cos(height) * Math.cos(bearing * rad)
    expect(Math.abs(Math.asin(sine) / rad + 9.31434)).toBeLessThan(0.01)
  })
  it('[STD] zenith 90.833 at sunrise and sunset, 96 at civil dawn and dusk, before refraction of 0.4841', () => {
    for (const day of ['2020-03-25', '2020-09-25', '2020-12-15']) {
      const sun = sunTimes(61.216667, -149.866667, at(`${day}T22:00:00Z`))
      const zenith = (ms: number | null) =>
        90 - (sunHeight(61.216667, -149.866667, ms ?? 0) - 0.4841)
      expect([sun.sunrise, sun.sunset].map(zenith)).toEqual(
        Array(2).fill(expect.closeTo(90.833, 2)),
      )
      expect([sun.civilDawn, sun.civilDusk].map(zenith)).toEqual(
        Array(2).fill(expect.closeTo(96, 2)),
      )
    }
  })
  it('[STD] zenith 102 at nautical and 108 at astronomical twilight; civil is that of sunTimes', () => {
    for (const day of ['2020-03-25', '2020-09-25', '2020-12-15']) {
      const at12 = at(`${day}T22:00:00Z`)
      const { civil, nautical, astronomical } = twilights(61.216667, -149.866667, at12)
      const zenith = (ms: number | null) =>
        90 - (sunHeight(61.216667, -149.866667, ms ?? 0) - 0.4841)
      for (const [twilight, degrees] of [
        [nautical, 102],
        [astronomical, 108],
      ] as const)
        expect([twilight.dawn, twilight.dusk].map(zenith)).toEqual(
          Array(2).fill(expect.closeTo(degrees, 2)),
        )
      const sun = sunTimes(61.216667, -149.866667, at12)
      expect(civil).toEqual({ dawn: sun.civilDawn, dusk: sun.civilDusk })
    }
  })
  it('[STD] 52 N at midsummer: nautical twilight ends, astronomical lasts all night; at 61 N not even civil ends', () => {
    const middle = twilights(52, 0, at('2020-06-21T12:00:00Z'))
    expect(middle.nautical.dusk).not.toBeNull()
    expect(middle.astronomical).toEqual({ dawn: null, dusk: null })
    const north = twilights(61.216667, -149.866667, at('2020-06-25T22:00:00Z'))
    expect(Object.values(north)).toEqual(Array(3).fill({ dawn: null, dusk: null }))
    expect(() => twilights(91, 0, 0)).toThrow('notAPoint')
  })
  it('[R6] the acceptance day, 47.1 N 93.2 W: sunset 16:29, civil dusk 17:03, leave by 16:13 with 20 min to ride out', () => {
    const sun = sunTimes(47.1, -93.2, at('2026-11-24T18:00:00Z'))
    near(sun.sunset, '2026-11-24T22:29:00Z')
    near(sun.civilDusk, '2026-11-24T23:03:00Z')
    const left = minutesToLeaveBy({
      nowMs: at('2026-11-24T21:13:00Z'),
      civilDuskMs: at('2026-11-24T23:03:00Z'),
      rideOutMinutes: 20,
    })
    expect(left).toBe(60)
    expect(minutesToLeaveBy({ nowMs: 0, civilDuskMs: null, rideOutMinutes: 20 })).toBeNull()
  })
})
