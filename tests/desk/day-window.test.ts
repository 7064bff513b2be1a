import { describe, expect, it } from 'vitest'
import { dayWindow } from '@/components/desk/daylight/day-window'

/**
 * Gate 4 of the acceptance world: 47.10000 N 93.20000 W, 24 November 2026, UTC-6: sunset 16:29, civil
 * dusk 17:03 (acceptance scenarios, "World for all"). Two minutes are allowed: the scenario rounds.
 */
const GATE = { latitude: 47.1, longitude: -93.2 }
const MINUTE = 60_000
const at = (hour: number, minute = 0, day = 24) => Date.UTC(2026, 10, day, hour + 6, minute)
const near = (ms: number, wanted: number) => expect(Math.abs(ms - wanted)).toBeLessThan(2 * MINUTE)

describe('the rule of daylight at the job', () => {
  it('[R6] draws from two hours back past the next dusk, with the sun crossing the horizon at sunset', () => {
    const day = dayWindow(GATE, at(12))
    expect(day.from).toBe(at(10))
    expect(day.to).toBeGreaterThan(at(19))
    expect(day.to - day.from).toBeLessThanOrEqual(24 * 60 * MINUTE)
    expect(day.nights).toHaveLength(1)
    near(day.nights[0]!.from, at(17, 3))
    expect(day.nights[0]!.to).toBe(day.to)
    near(day.twilights[0]!.from, at(16, 29))
    const before = day.curve.find((point) => point.at === at(16, 0))
    const after = day.curve.find((point) => point.at === at(17, 0))
    expect(before?.height).toBeGreaterThan(0)
    expect(after?.height).toBeLessThan(0)
  })

  it('[R6] keeps within a day when the next dawn is far', () => {
    const day = dayWindow(GATE, at(18))
    expect(day.to - day.from).toBeLessThanOrEqual(24 * 60 * MINUTE)
    expect(day.nights[0]!.from).toBeLessThan(at(18))
  })
})
