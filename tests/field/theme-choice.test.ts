// The theme of a page that is left open: field and desk keep it by the same timer.
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import { keepTheme, pickTheme } from '@/components/field/theme-choice'

/** The place and dusk of tests/field/theme.test.ts: civil dusk 17:03, UTC-6. */
const GATE = { latitude: 47.1, longitude: -93.2 }
const AFTERNOON = Date.parse('2026-11-24T22:58:00.000Z')
const MINUTE = 60_000

let theme: () => string | undefined

beforeEach(() => {
  vi.useFakeTimers({ now: AFTERNOON, toFake: ['setInterval', 'clearInterval', 'Date'] })
  const kept = new Map<string, string>()
  const root = { dataset: {} as { theme?: string } }
  vi.stubGlobal('localStorage', {
    getItem: (key: string) => kept.get(key) ?? null,
    setItem: (key: string, value: string) => kept.set(key, value),
  })
  vi.stubGlobal('document', { documentElement: root, querySelector: () => null })
  vi.stubGlobal(
    'window',
    Object.assign(new EventTarget(), { matchMedia: () => ({ matches: false }) }),
  )
  theme = () => root.dataset.theme
})
afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

const minutes = async (many: number) => {
  await vi.advanceTimersByTimeAsync(many * MINUTE)
  await vi.dynamicImportSettled()
}

describe('[design 2] a page left open', () => {
  test('turns to night at civil dusk of its place, without a press', async () => {
    const stop = keepTheme(GATE, () => Date.now())
    await minutes(1)
    expect(theme()).toBe('day')
    await minutes(10)
    expect(theme()).toBe('night')
    stop()
  })

  test('does so without a place too, by the nights that another page kept', async () => {
    const stopFirst = keepTheme(GATE, () => Date.now())
    await minutes(1)
    stopFirst()
    const stop = keepTheme(null, () => Date.now())
    expect(theme()).toBe('day')
    await minutes(10)
    expect(theme()).toBe('night')
    stop()
  })

  test('takes another choice at once, keeps to it over dusk, and lets go when it is closed', async () => {
    const stop = keepTheme(GATE, () => Date.now())
    pickTheme('shade')
    expect(theme()).toBe('shade')
    await minutes(10)
    expect(theme()).toBe('shade')
    pickTheme('auto')
    expect(theme()).toBe('night')
    await minutes(0)
    stop()
    pickTheme('day')
    expect(theme()).toBe('night')
  })
})
