import { expect, test } from 'vitest'
import { indexBook } from '@/lib/diag/book-index'
import { planModel } from '@/lib/diag/plan-model'
import type { CodeBookItem } from '@/lib/model/code-book'
import { caseOf } from './fixtures/entries'
import { SMALL_ITEMS } from './fixtures/small-book'

const MEANS = {
  bag: null,
  roles: ['mechanic' as const],
  minutesToLeaveBy: null,
  shop: { perMinuteMinor: 100, towMinor: 30_000, recoveryMinor: 60_000 },
  dark: false,
  people: 1 as const,
}
const setup = (id: string, requires: string[] = []): CodeBookItem => ({
  kind: 'setup',
  id,
  name: id,
  minutes: 1,
  requires,
  closedByTest: false,
  source: 'invented for tests',
})
const model = (items: readonly CodeBookItem[]) => {
  const index = indexBook({ version: 1, hash: '', publishedAt: '', items: [...items] })
  return planModel(caseOf([], { index }), MEANS).model
}
const ids = (items: readonly CodeBookItem[]) => model(items).setups?.map(({ id }) => id) ?? []

test('[E2] a plan holds the set-ups of its actions and no others, however many the book has', () => {
  const many = Array.from({ length: 60 }, (_, n) => setup(`other${n}`))
  expect(ids([...SMALL_ITEMS, ...many])).toEqual(ids(SMALL_ITEMS))
})

test('[E2] what a set-up requires comes with it', () => {
  const items = SMALL_ITEMS.map(
    (item): CodeBookItem =>
      item.kind === 'check' && item.id === 'plug' ? { ...item, setups: ['shroudOff'] } : item,
  )
  const found = ids([...items, setup('shroudOff', ['hoodOff']), setup('hoodOff')])
  expect(found).toContain('shroudOff')
  expect(found).toContain('hoodOff')
})
