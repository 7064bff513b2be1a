import { describe, expect, it } from 'vitest'
import { codesOnRecord } from '@/lib/diag/codes-on-record'
import { entry } from '../field/checks-log'

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
