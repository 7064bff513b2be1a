import { describe, expect, it } from 'vitest'
import { FRESH, missingOf } from '@/components/checks/how-done'
import { swapSays } from '@/components/checks/swap-words'
import { moreSentence, proofSentence, stopwatch } from '@/components/outcome/proof-words'
import { minutesOf, ranUntil } from '@/components/outcome/use-proof-draft'
import { adviceSentences } from '@/components/parts/part-advice'
import { adviceFor } from '@/lib/diag/part-choice'
import { swapProgress } from '@/lib/diag/swap-progress'
import type { LogEntry } from '@/lib/model/log-entry'
import { entry } from './checks-log'

const step = (
  name: 'spareFitted' | 'oldRefitted' | 'newFitted',
  faultPresent: boolean | null,
): LogEntry =>
  entry({
    kind: 'swap',
    swapId: 'coilSwap',
    step: name,
    faultPresent,
    partFrom: 'bag',
    partWords: null,
  })

describe('a swap in its order', () => {
  it('[F5] says plainly when the old part was not refitted', () => {
    const progress = swapProgress('coilSwap', [
      step('spareFitted', false),
      step('oldRefitted', null),
    ])
    expect(progress.swappedBack).toBe('notDone')
    expect(swapSays(progress, 'ignition coil')).toMatch(/^Not swapped back/)
  })

  it('[F5] says that it is confirmed only when the fault came back with the old part', () => {
    const back = swapProgress('coilSwap', [step('spareFitted', false), step('oldRefitted', true)])
    const away = swapProgress('coilSwap', [step('spareFitted', false), step('oldRefitted', false)])
    expect(swapSays(back, 'ignition coil')).toMatch(/confirmed/)
    expect(swapSays(away, 'ignition coil')).toMatch(/moving the plug may have cured it/)
  })
})

describe('the proof run', () => {
  // One-sided Clopper-Pearson (1934) with no faults: 1 - 0.05^(1/n). 12: 0.2209, 5: 0.4507, 29: 0.0981.
  it('[F7] twelve clean restarts leave up to 22 of 100, and the 3/n rule says 25', () => {
    expect(proofSentence({ starts: 12, faults: 0 })).toBe(
      '12 clean restarts: up to 22 of 100 starts could still fail (one-sided 95 %). The 3/n rule says 25.',
    )
    expect(moreSentence({ starts: 12, faults: 0 })).toBe(
      '17 more clean starts would bring it under 10 of 100 (the goal is common practice, no source).',
    )
  })

  it('[F7] five leave up to 45 of 100; 29 are enough for 10', () => {
    expect(proofSentence({ starts: 5, faults: 0 })).toMatch(/up to 45 of 100/)
    expect(moreSentence({ starts: 29, faults: 0 })).toBe(
      'That is under 10 of 100 (the goal is common practice, no source).',
    )
  })

  it('[F7] a fault in it is said first and has no 3/n rule', () => {
    const words = proofSentence({ starts: 12, faults: 1 })
    expect(words).toMatch(/^1 of 12 restarts with the fault/)
    expect(words).toMatch(/not proved/)
    expect(words).not.toMatch(/3\/n/)
    expect(moreSentence({ starts: 12, faults: 1 })).toBeNull()
  })

  it('[F7] nothing is proved by no start', () => {
    expect(proofSentence({ starts: 0, faults: 0 })).toMatch(/nothing is proved/)
  })

  it('[R8] the clock runs on over a dead phone and never backwards', () => {
    const draft = { runningSince: '2026-11-24T18:00:00.000Z', ranMs: 60_000 }
    expect(ranUntil(draft, Date.parse('2026-11-24T18:10:00.000Z'))).toBe(660_000)
    expect(ranUntil(draft, Date.parse('2026-11-24T17:00:00.000Z'))).toBe(60_000)
    expect(stopwatch(660_000)).toBe('11:00')
    expect(stopwatch(3_725_000)).toBe('1:02:05')
  })

  it('[F7] typed minutes win over the clock, an empty field does not', () => {
    const draft = {
      starts: 0,
      faults: 0,
      runningSince: null,
      ranMs: 0,
      hot: null,
      words: '',
    } as const
    expect(minutesOf({ ...draft, typedMinutes: '10' }, 5000)).toBe(10)
    expect(minutesOf({ ...draft, typedMinutes: ' ' }, 600_000)).toBe(10)
  })

  it.each(['12 min', '1:30', '12.', '-3', '1e3', '1441'])(
    '[F7] typed minutes that are none are refused, not replaced by the clock: %s',
    (typedMinutes) => {
      expect(minutesOf({ typedMinutes }, 600_000)).toBeNull()
    },
  )

  it.each([
    ['12,5', 12.5],
    ['0', 0],
    ['1440', 1440],
  ])('[F7] typed minutes %s are taken', (typedMinutes, minutes) => {
    expect(minutesOf({ typedMinutes }, 600_000)).toBe(minutes)
  })
})

describe('what keeps an outcome from being recorded is said', () => {
  it('[R8] an empty or unreadable time, and a difference without words', () => {
    expect(missingOf(FRESH, true)).toBeNull()
    expect(missingOf({ ...FRESH, earlier: true }, false)).toBe(
      'Say at about what time it happened.',
    )
    expect(missingOf({ ...FRESH, earlier: true, about: '99' }, false)).toContain('14:05')
    expect(missingOf({ ...FRESH, earlier: true, about: '11:30' }, true)).toBeNull()
    expect(missingOf({ ...FRESH, asWritten: false, differed: ' ' }, true)).toContain('differed')
  })
})

describe('genuine or aftermarket part', () => {
  const coil = {
    part: 'ignitionCoil',
    genuineNumber: 'TM-4501-041',
    genuineMinor: 13_500,
    aftermarketNumber: 'AX-7741',
    aftermarketMinor: 2500,
    genuineFailsOf100: 2,
    aftermarketFailsOf100: 12,
    source: 'the demo shop (invented)',
  }

  it('[F8] the break-even of 135 and 25 with a recovery of 300 is 38.7 of 100', () => {
    const advised = adviceFor(coil, 30_000)
    expect(advised === null ? [] : adviceSentences(advised, 'USD')).toEqual([
      'Break-even: the aftermarket part pays until 38.7 of 100 fail.',
      'Expected cost with one recovery in it: genuine 141.00 USD, aftermarket 61.00 USD.',
      'By expected cost: fit the aftermarket part.',
    ])
  })

  it('[F8] without a figure there is a break-even and no advice', () => {
    const advised = adviceFor({ ...coil, aftermarketFailsOf100: null }, 30_000)
    expect(advised === null ? '' : adviceSentences(advised, 'USD')[1]).toMatch(/no advice/)
  })
})
