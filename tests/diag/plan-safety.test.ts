import { describe, expect, it } from 'vitest'
import { indexBook } from '@/lib/diag/book-index'
import { type Means, nextStep } from '@/lib/diag/plan'
import type { CheckItem } from '@/lib/model/code-book'
import { caseOf, code, log } from './fixtures/entries'
import { check, SMALL_ITEMS } from './fixtures/small-book'

const means: Means = {
  bag: null,
  roles: ['mechanic'],
  minutesToLeaveBy: null,
  shop: { perMinuteMinor: 160, towMinor: 30_000, recoveryMinor: 30_000 },
  dark: false,
  people: 2,
}

describe('[E2] safety before worth', () => {
  const twins = (over: Partial<CheckItem>) => {
    const table = { coil: [5, 95], wire: [90, 10] }
    const index = indexBook({
      version: 1,
      hash: '',
      publishedAt: '',
      items: [
        ...SMALL_ITEMS.filter((i) => i.kind !== 'check' && i.kind !== 'swap'),
        check('first', table, { minutes: 1, ...over }),
        check('second', table, { minutes: 1 }),
      ],
    })
    return nextStep(caseOf(log(code(1268, 3)), { index }), means)
  }
  const hot: CheckItem['cautions'] = [{ signal: 'WARNING', text: 'Hot metal: let it cool.' }]
  it('[E2] of two checks of equal worth the one without a caution goes first, and the other is told with its own', () => {
    expect(twins({}).next.id).toBe('first')
    const warned = twins({ cautions: hot })
    expect([warned.next.id, warned.runnerUp?.id]).toEqual(['second', 'first'])
    expect(warned).toMatchObject({ equal: true, runnerUp: { caution: hot[0] } })
    expect(warned.next.caution).toBeNull()
    expect(warned.outcomes.reduce((sum, o) => sum + o.chance, 0)).toBeCloseTo(1, 12)
  })
  it('[E2] of a free and a paid check of equal worth the free one goes first', () => {
    // 160 a minute: a minute less and its price more is the same money.
    const paid = twins({ minutes: 0.5, costMinor: 80 })
    expect([paid.next.id, paid.runnerUp?.id]).toEqual(['second', 'first'])
    expect(paid.equal).toBe(true)
  })
})
