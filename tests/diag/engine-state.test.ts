import { expect, test } from 'vitest'
import { indexBook } from '@/lib/diag/book-index'
import { nextStep } from '@/lib/diag/plan'
import type { CheckItem, CodeBookItem, SymptomItem } from '@/lib/model/code-book'
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

/** Why the check of the plug is left out, when the complaint leaves the engine so and the check wants it so. */
function reason(engine: SymptomItem['engine'], machineState: CheckItem['machineState']) {
  const items = SMALL_ITEMS.map((item): CodeBookItem => {
    if (item.kind === 'symptom') return { ...item, engine }
    return item.id === 'plug' && item.kind === 'check' ? { ...item, machineState } : item
  })
  const index = indexBook({ version: 1, hash: '', publishedAt: '', items })
  return nextStep(caseOf([], { index }), MEANS).leftOut.find(({ id }) => id === 'plug')?.reason
}

test('[R24] a check on a running engine is left out where the engine does not run', () => {
  expect(reason('runs', 'runningNeutral')).toBeUndefined()
  expect(reason('cranks', 'runningNeutral')).toBe('Not while the engine does not run.')
  expect(reason('cranks', 'guardedStand')).toBe('Not while the engine does not run.')
  expect(reason('cranks', 'cranking')).toBeUndefined()
})

test('[R24] nothing turns an engine that must be left still', () => {
  expect(reason('still', 'cranking')).toBe('Not while the engine must not or cannot turn.')
  expect(reason('still', 'keyOn')).toBeUndefined()
  expect(reason('still', 'off')).toBeUndefined()
})
