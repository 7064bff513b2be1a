import { v7 } from 'uuid'
import { describe, expect, it } from 'vitest'
import type { Role } from '@/lib/model/role'
import type { Known } from '@/lib/sync/server/known'
import { adviceKeep, jobOpen, logAdd, machineAdd, note, partRequestAsk } from '../support/field-ops'
import { plan, world } from '../support/plan-world'

describe('what a role may send', () => {
  const REFUSED: Record<string, [Role[], (w: ReturnType<typeof world>) => unknown]> = {
    'a guide asking for parts': [['guide'], (w) => w.device.op(partRequestAsk(w.jobId))],
    'a guide writing a fix': [
      ['guide'],
      (w) =>
        w.device.op(
          logAdd(w.device, w.jobId, {
            kind: 'fix',
            fault: 'ignitionCoilPart',
            words: 'x',
            temporary: null,
          }),
        ),
    ],
    'a guide doing a check not marked safe': [
      ['guide'],
      (w) =>
        w.device.op(
          logAdd(w.device, w.jobId, {
            kind: 'check',
            checkId: 'fuelPressure',
            outcome: 'good',
            asWritten: true,
            differed: null,
          }),
        ),
    ],
    'a guide closing a job': [
      ['guide'],
      (w) =>
        w.device.op({
          kind: 'job.move',
          entityId: w.jobId,
          jobId: w.jobId,
          fields: { from: 'open', to: 'closed', reason: null },
        }),
    ],
    'parts opening a job': [['parts'], (w) => w.device.op(jobOpen(w.machineId))],
    'a dispatcher writing a reading': [
      ['dispatcher'],
      (w) =>
        w.device.op(
          logAdd(w.device, w.jobId, { kind: 'couldNot', checkId: 'tetherLook', reason: 'x' }),
        ),
    ],
    'a dispatcher keeping advice': [['dispatcher'], (w) => w.device.op(adviceKeep(w.jobId))],
    'a guide adding a machine': [['guide'], (w) => w.device.op(machineAdd())],
    'a dispatcher writing in the field at all': [
      ['dispatcher'],
      (w) => w.device.op(logAdd(w.device, w.jobId, note('read along'))),
    ],
    'a dispatcher moving people': [
      ['dispatcher'],
      (w) =>
        w.device.op({
          kind: 'job.people',
          entityId: w.jobId,
          jobId: w.jobId,
          fields: { from: 'withMachine', to: 'safe' },
        }),
    ],
    'a mechanic assigning': [
      ['mechanic'],
      (w) =>
        w.device.op({
          kind: 'job.move',
          entityId: w.jobId,
          jobId: w.jobId,
          fields: { from: 'open', to: 'assigned', reason: null },
        }),
    ],
    'nobody at all': [[], (w) => w.device.op(logAdd(w.device, w.jobId, note('x')))],
  }
  for (const [who, [roles, make]] of Object.entries(REFUSED)) {
    it(`[P11] refuses ${who}`, () => {
      const w = world(roles)
      const done = plan([make(w)], w.known)
      expect(done.results).toMatchObject([{ result: 'rejected', code: 'forbidden' }])
      expect(done.outcomes).toHaveLength(1)
    })
  }

  it('[R16] takes a guide’s check that is marked safe', () => {
    const { device, known, jobId } = world(['guide'])
    const op = device.op(
      logAdd(device, jobId, {
        kind: 'check',
        checkId: 'tetherLook',
        outcome: 'good',
        asWritten: true,
        differed: null,
      }),
    )
    expect(plan([op], known).results).toEqual([])
  })

  it('[R8] lets a guide strike their own line and not a mechanic’s evidence', () => {
    const { device, known, jobId } = world(['guide'])
    const theirs = logAdd(
      device,
      jobId,
      { kind: 'check', checkId: 'fuelPressure', outcome: 'good', asWritten: true, differed: null },
      { authorId: v7() },
    ).fields
    const own = device.op(logAdd(device, jobId, note('wrong line')))
    const correct = (id: string) =>
      device.op(logAdd(device, jobId, { kind: 'correction', reason: 'Wrong' }, { supersedes: id }))
    const bad = correct(theirs.id)
    const held: Known = {
      ...known,
      entries: new Map([[theirs.id, jobId]]),
      deciding: new Map([[theirs.id, theirs]]),
    }
    const done = plan([own, correct(own.entityId), bad], held)
    expect(done.results).toMatchObject([{ opId: bad.id, code: 'forbidden' }])
    expect(done.effects.entries).toHaveLength(2)
  })

  it('[P11] refuses to move a job in other hands but keeps the evidence', () => {
    const { device, known, jobId, stand } = world()
    const theirs: Known = {
      ...known,
      jobs: new Map([[jobId, { ...stand, openedBy: v7(), assignedTo: [v7()] }]]),
    }
    const move = device.op({
      kind: 'job.people',
      entityId: jobId,
      jobId,
      fields: { from: 'withMachine', to: 'safe' },
    })
    const entry = device.op(logAdd(device, jobId, { kind: 'people', to: 'safe', words: null }))
    const done = plan([move, entry], theirs)
    expect(done.results).toMatchObject([{ opId: move.id, code: 'forbidden' }])
    expect(done.effects.entries).toHaveLength(1)
  })
})
