import { describe, expect, it } from 'vitest'
import { leaveByWords, minutesTo, nextTime } from '@/components/engine/leave-by'

const ZONE = 'Etc/GMT+6'

describe('a time to leave by', () => {
  it.each([
    // Set at 23:50 for half past midnight: 40 minutes, not 23 hours over.
    ['00:30', '2026-11-25T05:50:10.000Z', '2026-11-25T06:30:00.000Z', 39],
    ['16:33', '2026-11-24T18:20:30.000Z', '2026-11-24T22:33:00.000Z', 252],
    ['12:20', '2026-11-24T18:20:30.000Z', '2026-11-24T18:20:00.000Z', -1],
    ['12:00', '2026-11-24T18:20:30.000Z', '2026-11-25T18:00:00.000Z', 1419],
  ])('[R6] %s is the next time the clock shows it', (clock, now, at, minutes) => {
    expect(nextTime(clock, ZONE, Date.parse(now))).toBe(at)
    expect(minutesTo(at, Date.parse(now))).toBe(minutes)
  })

  it('[R6] stays the same instant when midnight passes, and is over once it is past', () => {
    const at = nextTime('00:30', ZONE, Date.parse('2026-11-25T05:50:00.000Z'))
    const minutes = ['T05:50', 'T06:10', 'T06:30', 'T06:45'].map((time) =>
      minutesTo(at, Date.parse(`2026-11-25${time}:00.000Z`)),
    )
    expect(minutes).toEqual([40, 20, 0, -15])
  })

  it('[R6] shows that time on the clock also where the clocks change before it', () => {
    // Clocks go back from 02:00 to 01:00 on 1 November 2026 (United States, Energy Policy Act of 2005).
    const now = Date.parse('2026-11-01T04:00:00.000Z')
    const at = nextTime('05:00', 'America/Chicago', now)
    expect(at).toBe('2026-11-01T11:00:00.000Z')
    expect(leaveByWords(at, 'America/Chicago', now)).toBe('05:00, Sun 1 Nov 2026')
    expect(leaveByWords(at, 'America/Chicago', Date.parse(at))).toBe('05:00')
  })
})
