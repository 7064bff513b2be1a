import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { firstSource, isLast } from '@/components/checks/swap-step-form'
import { TakenHeld } from '@/components/field/log/taken-held'
import { settingWords } from '@/components/field/settings/setting-words'
import { condemnedState } from '@/components/parts/ask-part-screen'
import { Choice } from '@/components/ui/choice'
import { isAsking, isHeldDown } from '@/components/ui/hold'
import { placeAt } from '../support/field-sets'

describe('[F5] where a swapped part comes from', () => {
  it('[F5] is asked of the new part by itself: the bag first, else the shop', () => {
    expect(firstSource('newFitted', { quantity: 1, knownGood: false })).toMatchObject({
      from: 'bag',
      knownGood: 'no',
    })
    expect(firstSource('newFitted', undefined)).toMatchObject({ from: 'shop', knownGood: 'no' })
    expect(firstSource('spareFitted', undefined)).toMatchObject({ from: 'twin', knownGood: 'no' })
    expect(firstSource('spareFitted', { quantity: 2, knownGood: true }).knownGood).toBe('yes')
  })

  it('[F5] what was said of the parts goes with the end of the round', () => {
    expect(isLast('newFitted', false)).toBe(true)
    expect(isLast('spareFitted', true)).toBe(true)
    expect(isLast('spareFitted', false)).toBe(false)
    expect(isLast('oldRefitted', null)).toBe(false)
  })
})

describe('[F8] the entry behind a request', () => {
  it.each([
    [{ asked: false, working: true, failed: false }, 'none'],
    [{ asked: true, working: true, failed: false }, 'working'],
    [{ asked: true, working: true, failed: true }, 'failed'],
    [{ asked: true, working: false, failed: false }, 'known'],
  ] as const)('[F8] %o is %s', (of, state) => {
    expect(condemnedState(of)).toBe(state)
  })
})

describe('[design 4] what asks by holding', () => {
  it('[design 4] is held by a finger or the main button alone', () => {
    expect(isHeldDown({ button: 0 }, false)).toBe(true)
    expect(isHeldDown({ button: 2 }, false)).toBe(false)
    expect(isHeldDown({ button: 0 }, true)).toBe(false)
  })

  it('[design 4] asks a keyboard after a hold as well, and not the press that ends one', () => {
    expect(isAsking({ detail: 1 }, false)).toBe(true)
    expect(isAsking({ detail: 1 }, true)).toBe(false)
    expect(isAsking({ detail: 0 }, true)).toBe(true)
  })
})

describe('[R8] what was taken is held until it is saved', () => {
  it('[R8] by person and job, until it is let go of', () => {
    const held = new TakenHeld<string>()
    expect(held.get('p1 j1')).toBeNull()
    held.set('p1 j1', 'first')
    held.set('p1 j1', 'second')
    expect([held.get('p1 j1'), held.get('p2 j1')]).toEqual(['second', null])
    held.set('p1 j1', null)
    expect(held.get('p1 j1')).toBeNull()
  })
})

describe('what a form says', () => {
  it('[M4] a fix that told no accuracy is not said to be good to 0 m', () => {
    const place = { ...placeAt(47.1, 'By the gate'), source: 'fix', accuracyMetres: null } as const
    expect(settingWords({ field: 'place', value: place })).toContain('of an accuracy not told')
    const told = { ...place, accuracyMetres: 7.6 }
    expect(settingWords({ field: 'place', value: told })).toContain('good to 8 m')
  })

  it('[design 9] the hint of a choice is read out with it', () => {
    const page = renderToStaticMarkup(
      createElement(Choice<'a'>, {
        legend: 'Which',
        hint: 'Any of them',
        value: null,
        onChange: () => undefined,
        options: [{ value: 'a', label: 'A' }],
      }),
    )
    const [, id] = /aria-describedby="([^"]+)"/.exec(page) ?? []
    expect(page).toContain(`<p id="${id}" class="mb-1.5 text-second text-ink2">Any of them</p>`)
  })
})
