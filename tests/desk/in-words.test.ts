import { expect, it } from 'vitest'
import { inWords } from '@/components/desk/board/in-words'

const NOW = Date.parse('2026-11-24T20:00:00.000Z')
const AT = { zone: 'Etc/UTC', now: NOW }
const TODAY = '2026-11-24T14:22:00.000Z'

it.each([
  [{ heardAt: TODAY, photosMissing: 0 }, 'last entry in 14:22, no photo or voice note missing'],
  [{ heardAt: TODAY, photosMissing: 1 }, 'last entry in 14:22, 1 photo or voice note on the phone'],
  [
    { heardAt: '2026-11-23T09:05:00.000Z', photosMissing: 2 },
    'last entry in 23 Nov 09:05, 2 photos or voice notes on the phone',
  ],
  [{ heardAt: null, photosMissing: 0 }, 'nothing written yet'],
])('[R19] %j is told as: %s, and never as all of it', (row, words) => {
  expect(inWords(row, AT)).toBe(words)
  expect(words).not.toMatch(/\ball\b/i)
})
