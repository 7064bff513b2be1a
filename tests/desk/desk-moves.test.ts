import { describe, expect, it } from 'vitest'
import type { JobState } from '@/lib/model/job'
import { PART_LINE_STATES } from '@/lib/model/part-request'
import { moveLine, stateAfterAssigning } from '@/lib/shop/desk-moves'

const tove = { id: 'p1', roles: ['mechanic' as const] }
const rhee = { id: 'p2', roles: ['dispatcher' as const] }
const job = (state: JobState, assignedTo: string[] = []) => ({ state, assignedTo })

describe('assigning', () => {
  it.each([
    ['called', true, [], 'assigned'],
    ['open', true, [], 'assigned'],
    ['assigned', true, ['p9'], 'assigned'],
    ['underWay', true, [], 'underWay'],
    ['waitingParts', true, [], 'waitingParts'],
    ['assigned', false, ['p1'], 'open'],
    ['assigned', false, ['p1', 'p9'], 'assigned'],
    ['underWay', false, ['p1'], 'underWay'],
  ] as const)(
    '[R13] a job that is %s, assigned %s from %j, is then %s',
    (state, on, hands, then) => {
      expect(stateAfterAssigning(job(state, [...hands]), tove, on)).toEqual({
        ok: true,
        value: then,
      })
    },
  )

  it('[R13] refuses a closed job, and people who do not work in the field', () => {
    const refused = (kind: string) => ({ ok: false, problem: { kind } })
    expect(stateAfterAssigning(job('closed'), tove, true)).toEqual(refused('jobClosed'))
    expect(stateAfterAssigning(job('closed', ['p1']), tove, false)).toEqual(refused('jobClosed'))
    expect(stateAfterAssigning(job('open'), rhee, true)).toEqual(refused('cannotTakeJobs'))
    // Somebody whose role changed meanwhile can still be taken off.
    expect(stateAfterAssigning(job('assigned', ['p2']), rhee, false)).toEqual({
      ok: true,
      value: 'open',
    })
  })
})

describe('moving a part line', () => {
  const line = { state: 'asked' as const, number: null, price: null }
  const price = { minor: 2_500, currency: 'USD' }

  it('[R14] identifies with a number, quotes with a price, cancels, and keeps what was known', () => {
    const identified = moveLine(line, { from: 'asked', to: 'identified', number: 'K-4410' })
    expect(identified).toEqual({
      ok: true,
      value: { state: 'identified', number: 'K-4410', price: null },
    })
    const known = { state: 'identified' as const, number: 'K-4410', price: null }
    expect(moveLine(known, { from: 'identified', to: 'quoted', number: null, price })).toEqual({
      ok: true,
      value: { state: 'quoted', number: 'K-4410', price },
    })
    const quoted = { state: 'quoted' as const, number: 'K-4410', price }
    expect(moveLine(quoted, { from: 'quoted', to: 'cancelled' })).toEqual({
      ok: true,
      value: { state: 'cancelled', number: 'K-4410', price },
    })
  })

  it('[R14] refuses a press on a screen that is behind, and says how the line stands now', () => {
    expect(moveLine({ ...line, state: 'ordered' }, { from: 'asked', to: 'cancelled' })).toEqual({
      ok: false,
      problem: { kind: 'movedMeanwhile', now: 'ordered' },
    })
  })

  it('[R14] refuses every move out of an end state or into one it cannot reach', () => {
    for (const state of PART_LINE_STATES) {
      const answer = moveLine({ ...line, state }, { from: state, to: 'identified', number: 'K-1' })
      expect([state, answer.ok]).toEqual([state, state === 'asked' || state === 'quoted'])
      if (!answer.ok) expect(answer.problem).toEqual({ kind: 'illegalMove', now: state })
    }
  })
})
