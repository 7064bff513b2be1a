import { describe, expect, it } from 'vitest'
import { swapProgress } from '@/components/checks/swap-progress'
import { swapSays } from '@/components/checks/swap-words'
import { saysNothingOf, twinOf } from '@/components/checks/twin-words'
import { codesOnRecord } from '@/components/field/codes/codes-on-record'
import {
  moreSentence,
  proofBound,
  proofSentence,
  stopwatch,
} from '@/components/outcome/proof-words'
import { minutesOf, ranUntil } from '@/components/outcome/use-proof-draft'
import { condemnedBy } from '@/components/parts/condemned-by'
import { adviceFor, adviceRecord, adviceSentences } from '@/components/parts/part-advice'
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
  it('[F5] opens one step at a time: good part, old part, new part', () => {
    const a = step('spareFitted', false)
    const b = step('oldRefitted', true)
    const c = step('newFitted', false)
    expect(swapProgress('coilSwap', []).next).toBe('spareFitted')
    expect(swapProgress('coilSwap', [a]).next).toBe('oldRefitted')
    expect(swapProgress('coilSwap', [a, b]).next).toBe('newFitted')
    expect(swapProgress('coilSwap', [a, b, c]).next).toBeNull()
  })

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

  it('[F5] ends when the good part cures nothing, and begins anew when it is fitted again', () => {
    const first = step('spareFitted', true)
    expect(swapProgress('coilSwap', [first])).toMatchObject({ next: null, noChange: true })
    const again = swapProgress('coilSwap', [first, step('spareFitted', false)])
    expect(again).toMatchObject({ next: 'oldRefitted', noChange: false })
    expect(again.done).toHaveLength(1)
  })

  it('[F5] steps of another swap do not count', () => {
    expect(swapProgress('plugSwap', [step('spareFitted', false)]).next).toBe('spareFitted')
  })
})

describe('a good twin', () => {
  const reading = (subject: 'suspect' | 'knownGood', asTyped: string): LogEntry =>
    entry({
      kind: 'reading',
      checkId: 'coilPrimaryResistance',
      quantity: 'resistance',
      value: Number(asTyped),
      unit: 'ohm',
      asTyped,
      overRange: false,
      subject,
      meterId: '01980000-0000-7000-8000-000000000401',
      meterName: 'Pocket meter (demo)',
      meterFunction: { percent: 0.8, digits: 3, resolution: 0.1 },
      leadsOhm: { low: 0.3, high: 0.6 },
      nulled: false,
      partTempC: 20,
      meterTempC: 20,
      perKelvin: 0.1,
      spec: null,
      result: null,
    })

  it('[R17] is only there when both were read, and takes the last of each', () => {
    const a = reading('suspect', '1.0')
    const b = reading('suspect', '1.1')
    const good = reading('knownGood', '1.0')
    expect(twinOf('coilPrimaryResistance', [a, b])).toBeNull()
    expect(twinOf('coilPrimaryResistance', [a, b, good])?.suspect.id).toBe(b.id)
  })

  it('[F4] says nothing only when no suspect was moved by the reading', () => {
    const why = (logRatio: number) => [{ why: [{ entryId: 'x', saysNothing: false, logRatio }] }]
    expect(saysNothingOf(why(0), 'x')).toBe(true)
    expect(saysNothingOf(why(-0.4), 'x')).toBe(false)
  })
})

describe('the proof run', () => {
  // One-sided Clopper-Pearson (1934) with no faults: 1 - 0.05^(1/n). 12: 0.2209, 5: 0.4507, 29: 0.0981.
  it('[F7] twelve clean restarts leave up to 22 of 100, and the 3/n rule says 25', () => {
    expect(proofSentence({ starts: 12, faults: 0 })).toBe(
      '12 clean restarts: up to 22 of 100 starts could still fail (one-sided 95 %). The 3/n rule says 25.',
    )
    expect(moreSentence({ starts: 12, faults: 0 })).toBe(
      '17 more clean starts would bring it under 10 of 100.',
    )
    expect(proofBound({ starts: 12, faults: 0 }).exact).toBeCloseTo(0.2209, 4)
  })

  it('[F7] five leave up to 45 of 100; 29 are enough for 10', () => {
    expect(proofSentence({ starts: 5, faults: 0 })).toMatch(/up to 45 of 100/)
    expect(proofBound({ starts: 28, faults: 0 }).more).toBe(1)
    expect(moreSentence({ starts: 29, faults: 0 })).toBe('That is under 10 of 100.')
  })

  it('[F7] a fault in it is said first and has no 3/n rule', () => {
    const words = proofSentence({ starts: 12, faults: 1 })
    expect(words).toMatch(/^1 of 12 restarts with the fault/)
    expect(words).toMatch(/not proved/)
    expect(words).not.toMatch(/3\/n/)
    expect(moreSentence({ starts: 12, faults: 1 })).toBeNull()
  })

  it('[F7] nothing is proved by no start', () => {
    expect(proofBound({ starts: 0, faults: 0 })).toMatchObject({ exact: null, ruleOfThree: null })
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
})

describe('codes before they vanish', () => {
  it('[R11] may be cleared only once they are on record or said to be unreadable', () => {
    const code = entry({
      kind: 'code',
      seen: { format: 'spn', spn: 1268, fmi: 3 },
      context: { module: 0, status: 'active', count: null, order: 1, photo: null },
    })
    const dark = entry({ kind: 'codesUnreadable', reason: 'Dash dark' })
    expect(codesOnRecord([])).toBe(false)
    expect(codesOnRecord([code])).toBe(true)
    expect(codesOnRecord([dark])).toBe(true)
    const taken = entry({ kind: 'correction', reason: 'Wrong machine' }, code.id)
    expect(codesOnRecord([code, taken])).toBe(false)
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
    expect(adviceRecord(advised)).toMatchObject({ advised: 'aftermarket', aftermarketFails: 0.12 })
  })

  it('[F8] the advice turns at the break-even', () => {
    const at = (aftermarketFailsOf100: number) =>
      adviceFor({ ...coil, aftermarketFailsOf100 }, 30_000)?.advice.advised
    expect([at(38), at(39)]).toEqual(['aftermarket', 'genuine'])
  })

  it('[F8] without a figure there is a break-even and no advice', () => {
    const advised = adviceFor({ ...coil, aftermarketFailsOf100: null }, 30_000)
    expect(advised?.advice.advised).toBe('noFigure')
    expect(advised === null ? '' : adviceSentences(advised, 'USD')[1]).toMatch(/no advice/)
    expect(adviceFor({ ...coil, aftermarketMinor: null }, 30_000)).toBeNull()
  })

  it('[R14] a line names the entry that spoke most for the fault', () => {
    const why = (entryId: string, about: string, logRatio: number) => ({
      entryId,
      about,
      logRatio,
      label: '',
      saysNothing: false,
    })
    const of = (...list: ReturnType<typeof why>[]) => condemnedBy({ why: list } as never)
    expect(of(why('a', 'swap', 2), why('b', 'reading', 0.3), why('c', 'code', 5))).toBe('a')
    expect(of(why('a', 'check', -2))).toBeNull()
  })
})
