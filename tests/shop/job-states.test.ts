import { describe, expect, it } from 'vitest'
import { JOB_STATES, MACHINE_STATES, PEOPLE_STATES } from '@/lib/model/job'
import { PART_LINE_STATES } from '@/lib/model/part-request'
import { actionToMoveJob, mayMove, movesFrom } from '@/lib/shop/job-states'

describe('states of a job', () => {
  it('[R13] no state moves to itself', () => {
    for (const s of JOB_STATES) expect(mayMove('job', s, s)).toBe(false)
    for (const s of PEOPLE_STATES) expect(mayMove('people', s, s)).toBe(false)
    for (const s of MACHINE_STATES) expect(mayMove('machine', s, s)).toBe(false)
    for (const s of PART_LINE_STATES) expect(mayMove('partLine', s, s)).toBe(false)
  })

  it('[R13] a closed job can only be reopened, as open', () => {
    expect(movesFrom('job', 'closed')).toEqual(['open'])
  })

  it('[R13] every job state can be reached from called', () => {
    const seen = new Set<string>(['called'])
    const queue: (typeof JOB_STATES)[number][] = ['called']
    for (let at = queue.pop(); at !== undefined; at = queue.pop()) {
      for (const next of movesFrom('job', at))
        if (!seen.has(next)) {
          seen.add(next)
          queue.push(next)
        }
    }
    expect([...seen].sort()).toEqual([...JOB_STATES].sort())
  })

  it('[R13] nothing becomes called again', () => {
    expect(JOB_STATES.filter((s) => mayMove('job', s, 'called'))).toEqual([])
  })

  it('[R2] a stranded machine reaches the shop only by its own power or on a tow', () => {
    expect(mayMove('machine', 'stranded', 'atShop')).toBe(false)
    expect(mayMove('machine', 'leftBehind', 'atShop')).toBe(false)
    expect(mayMove('machine', 'onTow', 'atShop')).toBe(true)
  })

  it('[R2] people who are safe are not being fetched', () => {
    expect(mayMove('people', 'safe', 'beingFetched')).toBe(false)
    expect(mayMove('people', 'beingFetched', 'safe')).toBe(true)
  })

  it('[R14] a part is credited only after it went back, and cancelled only before it came', () => {
    expect(PART_LINE_STATES.filter((s) => mayMove('partLine', s, 'credited'))).toEqual(['returned'])
    expect(mayMove('partLine', 'promised', 'cancelled')).toBe(true)
    expect(mayMove('partLine', 'received', 'cancelled')).toBe(false)
  })

  it('[R13] closing and assigning ask for their own permission', () => {
    expect(actionToMoveJob('closed')).toBe('job.close')
    expect(actionToMoveJob('assigned')).toBe('job.assign')
    expect(actionToMoveJob('underWay')).toBe('job.work')
  })
})
