import { describe, expect, it } from 'vitest'
import { movesBack, movesOf } from '@/components/outcome/way-out-moves'
import { NOTICE_WORDS, refusalWords, SAID_WORDS } from '@/components/outcome/way-out-words'
import { SAID_BY_HAND } from '@/lib/diag/way-out'
import { JOB_STATES, type Job, MACHINE_STATES, PEOPLE_STATES, WAYS_OUT } from '@/lib/model/job'
import type { Role } from '@/lib/model/role'
import { mayMove } from '@/lib/shop/job-states'
import { mayRecord } from '@/lib/shop/may-record'
import { statesAfter } from '@/lib/shop/way-out-states'
import type { OpInput } from '@/lib/sync/protocol/op'

describe('the way out, as it is said', () => {
  it('[R10] every refusal has its sentence, with the figures it was refused for', () => {
    const battery = { entryId: 'x', asTyped: '11.86', unit: 'V', emptyAtVolts: 11.9 }
    expect(refusalWords({ kind: 'emptyBattery', ...battery })).toBe(
      'Battery empty: 11.86 V DC at rest, 11.9 V or less counts as empty (flooded lead-acid, table credited to the battery makers’ trade body).',
    )
    expect(refusalWords({ kind: 'said', what: 'noBrake' })).toBe('No working brake.')
    expect(refusalWords({ kind: 'hurt' })).toBe('Somebody is hurt.')
    expect(refusalWords({ kind: 'causeUnknown', strokes: 'two' })).toMatch(/two-stroke/)
    expect(refusalWords({ kind: 'causeUnknown', strokes: 'notKnown' })).toMatch(/four-stroke/)
    const fault = { fault: 'f', name: 'Piston', bookWords: 'It seizes.' }
    expect(refusalWords({ kind: 'faultForbids', ...fault })).toBe('Piston: It seizes.')
  })

  it('[R10] no two lines that are asked by hand read alike', () => {
    const words = SAID_BY_HAND.map((one) => SAID_WORDS[one])
    expect(new Set(words).size).toBe(SAID_BY_HAND.length)
  })

  it('[F6] a failed proof run is called no proof', () => {
    expect(NOTICE_WORDS.faultInProofRun).toMatch(/not proved/)
  })

  it('[R2] moves machine, people and job beside each other, only what changes', () => {
    const job = {
      id: 'j',
      machineState: 'stranded',
      peopleState: 'withMachine',
      state: 'open',
    } as const
    expect(movesOf(job, { machine: 'runs', people: 'withMachine' }).map((op) => op.kind)).toEqual([
      'job.machine',
      'job.move',
    ])
    const left = movesOf(job, { machine: 'leftBehind', people: 'onTheWay' })
    expect(left.at(-1)).toMatchObject({
      kind: 'job.move',
      fields: { from: 'open', to: 'waitingRetrieval' },
    })
    const waiting = { ...job, state: 'waitingParts', machineState: 'runs' } as const
    expect(movesOf(waiting, { machine: 'runs', people: 'withMachine' })).toEqual([])
  })
})

describe('a way out taken back', () => {
  type Stand = Pick<Job, 'id' | 'machineState' | 'peopleState' | 'state'>
  const ROLES: Role[] = ['mechanic']
  /** The stand after moves that the role may make and the state machines allow, one by one. */
  function done(job: Stand, ops: readonly OpInput[]): Stand {
    const at = { ...job }
    const step = (from: string, now: string, lawful: boolean) =>
      expect({ from, lawful }).toEqual({ from: now, lawful: true })
    for (const op of ops) {
      expect(mayRecord(op, { personId: 'p', roles: ROLES, guideSafe: new Set() })).toBe(true)
      if (op.kind === 'job.machine') {
        step(op.fields.from, at.machineState, mayMove('machine', op.fields.from, op.fields.to))
        at.machineState = op.fields.to
      } else if (op.kind === 'job.people') {
        step(op.fields.from, at.peopleState, mayMove('people', op.fields.from, op.fields.to))
        at.peopleState = op.fields.to
      } else if (op.kind === 'job.move') {
        step(op.fields.from, at.state, mayMove('job', op.fields.from, op.fields.to))
        at.state = op.fields.to
      } else throw new Error(op.kind)
    }
    return at
  }

  const STANDS = MACHINE_STATES.flatMap((machineState) =>
    PEOPLE_STATES.flatMap((peopleState) =>
      JOB_STATES.filter((state) => state !== 'closed').map((state) => ({
        id: 'j',
        machineState,
        peopleState,
        state,
      })),
    ),
  )

  it('[R2] puts machine and people back by lawful moves, wherever they stood', () => {
    for (const before of STANDS)
      for (const way of WAYS_OUT) {
        const put = statesAfter(way, before)
        const now = done(before, movesOf(before, put))
        const back = done(now, movesBack({ jobId: 'j', before, now, put, roles: ROLES }))
        expect([back.machineState, back.peopleState]).toEqual([
          before.machineState,
          before.peopleState,
        ])
      }
  })

  it('[R13] puts the job back where the mechanic may, else it is under way', () => {
    const backTo = (state: Job['state'], way: (typeof WAYS_OUT)[number]) => {
      const before = {
        id: 'j',
        machineState: 'stranded',
        peopleState: 'withMachine',
        state,
      } as const
      const put = statesAfter(way, before)
      const now = done(before, movesOf(before, put))
      return done(now, movesBack({ jobId: 'j', before, now, put, roles: ROLES })).state
    }
    expect(backTo('open', 'repairHere')).toBe('open')
    expect(backTo('waitingParts', 'returnLater')).toBe('waitingParts')
    expect(backTo('assigned', 'repairHere')).toBe('underWay')
    expect(backTo('assigned', 'returnLater')).toBe('underWay')
  })

  it('[R2] leaves alone what somebody else has moved on meanwhile', () => {
    const before = {
      id: 'j',
      machineState: 'stranded',
      peopleState: 'withMachine',
      state: 'open',
    } as const
    const now = { machineState: 'atShop', peopleState: 'safe', state: 'waitingParts' } as const
    const put = { machine: 'runs', people: 'onTheWay' } as const
    expect(movesBack({ jobId: 'j', before, now, put, roles: ROLES })).toEqual([])
  })
})
