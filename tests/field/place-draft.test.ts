import { describe, expect, it } from 'vitest'
import { EMPTY_INTAKE, type IntakeDraft } from '@/components/field/intake/intake-draft'
import { missingFrom } from '@/components/field/intake/intake-rules'
import { afterFix, afterTyping, NO_PLACE } from '@/components/field/intake/place-draft'
import type { Place } from '@/lib/model/place'

const AT = '2026-11-24T18:40:00.000Z'
const FIX: Place = {
  latitude: 47.1,
  longitude: -93.2,
  source: 'fix',
  accuracyMetres: 8,
  at: AT,
  asTyped: null,
  words: null,
}

/** The draft after each text, as typed one after the other. */
function typed(start: Partial<IntakeDraft>, ...texts: string[]): IntakeDraft {
  const draft = { ...EMPTY_INTAKE, ...start }
  for (const text of texts) Object.assign(draft, afterTyping(draft, text, AT))
  return draft
}

describe('the position of a new job', () => {
  it('[F1] clearing what was typed takes the position away', () => {
    const some = typed({}, '47.1 N 93.2 W')
    expect(some.place).toMatchObject({ source: 'typed', latitude: 47.1 })
    const none = typed({}, '47.1 N 93.2 W', '')
    expect(none.place).toBeNull()
    expect(missingFrom(none, 'place')).toBeNull()
  })

  it('[F1] a fix that was typed over comes back when the box is cleared', () => {
    const over = typed(afterFix(FIX), '47.2 N 93.3 W')
    expect(over.place).toMatchObject({ source: 'typed', latitude: 47.2 })
    expect(typed(over, '').place).toEqual(FIX)
    expect(typed(afterFix(FIX), '4', '47', '').place).toEqual(FIX)
  })

  it('[F1] what cannot be read leaves the fix, and the step undone', () => {
    const half = typed(afterFix(FIX), '47.')
    expect(half.place).toEqual(FIX)
    expect(missingFrom(half, 'place')).not.toBeNull()
  })

  it('[F1] a position can be removed, and does not come back by typing', () => {
    const none = { ...typed(afterFix(FIX), '47.2 N 93.3 W'), ...NO_PLACE }
    expect(none.place).toBeNull()
    expect(typed(none, '4', '').place).toBeNull()
  })

  it('[F1] digits read back as printed are the same position', () => {
    const { place } = typed({}, '47.10000 N 93.20000 W')
    expect(place).toMatchObject({ latitude: 47.1, longitude: -93.2, at: AT })
  })
})
