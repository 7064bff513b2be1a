import { describe, expect, test } from 'vitest'
import { nightsAt } from '@/components/field/nights'

const at = (iso: string) => Date.parse(iso)
const isNight = (lat: number, lon: number, iso: string) =>
  nightsAt(lat, lon, at(iso)).some(([from, to]) => at(iso) >= from && at(iso) < to)

describe('[design 2] the theme by the sun', () => {
  test('scenario S1 to S11: at 47.1 N 93.2 W on 24 November 2026 civil dusk is 17:03 (UTC-6)', () => {
    expect(isNight(47.1, -93.2, '2026-11-24T22:58:00Z')).toBe(false)
    expect(isNight(47.1, -93.2, '2026-11-24T23:08:00Z')).toBe(true)
    expect(isNight(47.1, -93.2, '2026-11-25T09:00:00Z')).toBe(true)
    expect(isNight(47.1, -93.2, '2026-11-25T18:00:00Z')).toBe(false)
  })

  test('no night where the sun does not set, one whole night where it gives no dawn', () => {
    expect(isNight(71, 25, '2026-06-21T00:00:00Z')).toBe(false)
    expect(isNight(84, 25, '2026-12-21T11:00:00Z')).toBe(true)
  })
})
