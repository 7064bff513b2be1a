import { describe, expect, it } from 'vitest'
import { swapProgress } from '@/lib/diag/swap-progress'
import type { LogEntry } from '@/lib/model/log-entry'
import { entry } from '../field/checks-log'

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

  it('[F5] tells refitted, not refitted and not yet apart', () => {
    const spare = step('spareFitted', false)
    const back = (...steps: LogEntry[]) => swapProgress('coilSwap', steps).swappedBack
    expect(back(spare)).toBe('notYet')
    expect(back(spare, step('oldRefitted', null))).toBe('notDone')
    expect(back(spare, step('oldRefitted', true))).toBe('yes')
    expect(back(spare, step('oldRefitted', false))).toBe('yes')
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
