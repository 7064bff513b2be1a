import { describe, expect, it } from 'vitest'
import { whenWords } from '@/components/field/when-words'

const ZONE = 'America/Chicago' // UTC-6 in November
const NOW = Date.parse('2026-11-25T03:30:00.000Z') // 24 Nov, 21:30 there

describe('a time at the desk', () => {
  it.each([
    ['2026-11-24T20:22:00.000Z', '14:22'],
    ['2026-11-25T03:29:00.000Z', '21:29'], // the next day in UTC, the same one there
    ['2026-11-24T05:59:00.000Z', '23 Nov 23:59'],
    ['2026-11-21T20:05:00.000Z', '21 Nov 14:05'],
    ['2025-11-24T20:22:00.000Z', '24 Nov 2025 14:22'], // a year ago is not today
  ])('[F14] %s is told as %s', (at, words) => {
    expect(whenWords(at, ZONE, NOW)).toBe(words)
  })

  it('[F14] names the day as long as the present is not known', () => {
    expect(whenWords('2026-11-24T20:22:00.000Z', ZONE, null)).toBe('24 Nov 14:22')
  })
})
