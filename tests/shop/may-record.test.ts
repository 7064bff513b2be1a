import { describe, expect, it } from 'vitest'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { ROLES, type Role } from '@/lib/model/role'
import { type Deed, mayInField, mayLogInField, mayRecord } from '@/lib/shop/may-record'
import { mayStrike } from '@/lib/shop/permissions'
import { entry } from '../field/checks-log'

const ME = '01980000-0000-7000-8000-000000000999'
const writer = (...roles: Role[]) => ({ personId: ME, roles, guideSafe: new Set(['tetherLook']) })
const line = (body: LogBody, supersedes: string | null = null): Deed => ({
  kind: 'log.add',
  fields: { body, supersedes },
})
const check = (checkId: string): LogBody => ({
  kind: 'check',
  checkId,
  outcome: 'good',
  asWritten: true,
  differed: null,
})
const who = (deed: Deed) => ROLES.filter((role) => mayRecord(deed, writer(role)))

describe('the one gate of everything written in the field', () => {
  const DEEDS: [string, Deed, Role[]][] = [
    ['a stranger’s machine', { kind: 'machine.add' }, ['mechanic', 'owner']],
    ['a new job', { kind: 'job.open' }, ['mechanic', 'guide', 'owner']],
    ['where people are', { kind: 'job.people' }, ['mechanic', 'guide', 'owner']],
    [
      'a job under way',
      { kind: 'job.move', fields: { to: 'underWay' } },
      ['mechanic', 'guide', 'owner'],
    ],
    ['a job closed', { kind: 'job.move', fields: { to: 'closed' } }, ['mechanic', 'owner']],
    ['a job assigned', { kind: 'job.move', fields: { to: 'assigned' } }, ['owner']],
    ['parts asked for', { kind: 'partRequest.ask' }, ['mechanic', 'owner']],
    ['advice', { kind: 'advice.keep' }, ['mechanic', 'guide', 'owner']],
    ['a note', line({ kind: 'note', words: 'x' }), ['mechanic', 'guide', 'owner']],
    ['a check for all', line(check('tetherLook')), ['mechanic', 'guide', 'owner']],
    ['a check for mechanics', line(check('fuelPressure')), ['mechanic', 'owner']],
  ]
  it.each(DEEDS)('[R22] %s', (_words, deed, roles) => {
    expect(who(deed)).toEqual(roles)
  })

  it('[R22] the dispatcher reads in the field and writes nothing there, at the desk they do', () => {
    for (const [, deed] of DEEDS) expect(mayRecord(deed, writer('dispatcher'))).toBe(false)
    expect(mayInField(['dispatcher'], 'job.work')).toBe(false)
    expect(mayLogInField(['dispatcher'], 'note')).toBe(false)
    expect(mayRecord({ kind: 'job.open' }, writer('dispatcher', 'mechanic'))).toBe(true)
  })
})

describe('taking an entry out of evidence', () => {
  const theirs = entry(check('fuelPressure'))
  const own: LogEntry = { ...theirs, authorId: ME }
  const correction = line({ kind: 'correction', reason: 'Wrong' }, theirs.id)

  it('[R8] one’s own, or what one may write oneself', () => {
    expect(mayRecord(correction, writer('mechanic'), theirs)).toBe(true)
    expect(mayRecord(correction, writer('guide'), theirs)).toBe(false)
    expect(mayRecord(correction, writer('guide'), own)).toBe(true)
    expect(mayRecord(correction, writer('guide'), entry(check('tetherLook')))).toBe(true)
    const note = entry({ kind: 'note', words: 'x' })
    expect(mayRecord(correction, writer('guide'), note)).toBe(true)
  })

  it('[R8] the desk strikes no evidence of the field', () => {
    for (const role of ['dispatcher', 'parts'] as const) {
      const of = { authorId: theirs.authorId, guideSafe: true }
      expect(mayStrike({ personId: ME, roles: [role] }, { ...of, kind: 'reading' })).toBe(false)
      expect(mayStrike({ personId: ME, roles: [role] }, { ...of, kind: 'note' })).toBe(true)
    }
  })

  it('[R8] brings nothing back by correcting another’s correction', () => {
    const theirCorrection = entry({ kind: 'correction', reason: 'Read wrong' }, theirs.id)
    expect(mayRecord(correction, writer('guide'), theirCorrection)).toBe(false)
    expect(mayRecord(correction, writer('mechanic'), theirCorrection)).toBe(true)
  })
})
