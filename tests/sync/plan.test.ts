import { v7 } from 'uuid'
import { describe, expect, it } from 'vitest'
import type { JobMachineState, WayOut } from '@/lib/model/job'
import { MAX_OP_BYTES } from '@/lib/sync/protocol/message'
import type { Known, Outcome } from '@/lib/sync/server/known'
import { takesProtocol, upgradeOp } from '@/lib/sync/server/upgrade'
import { adviceKeep, jobOpen, logAdd, note, partRequestAsk } from '../support/field-ops'
import { plan, world } from '../support/plan-world'

describe('planning a push', () => {
  it('[P5] takes a whole job in one batch and itemises nothing', () => {
    const { device, known, machineId } = world()
    const opening = jobOpen(machineId)
    const job = opening.fields.id
    const first = logAdd(device, job, note('one'))
    const ops = [
      device.op(opening),
      device.op(first),
      device.op(partRequestAsk(job)),
      device.op({
        kind: 'job.move',
        entityId: job,
        jobId: job,
        fields: { from: 'open', to: 'underWay', reason: null },
      }),
      device.op(adviceKeep(job)),
    ]
    const done = plan(ops, known)
    expect(done.results).toEqual([])
    expect(done.taken).toEqual(ops.map((op) => op.id))
    expect(done.effects.jobs).toHaveLength(1)
    expect(done.effects.jobs[0]?.stand.state).toBe('underWay')
    expect(done.effects.changedJobs.size).toBe(0)
  })

  it('[P5] lets one bad op cost only itself', () => {
    const { device, known, jobId } = world()
    const good = () => device.op(logAdd(device, jobId, note('fine')))
    const ops: unknown[] = [
      good(),
      { ...good(), surprise: 1 },
      good(),
      'not an op',
      { ...good(), kind: 'job.burn' },
      good(),
    ]
    const done = plan(ops, known)
    expect(done.effects.entries).toHaveLength(3)
    expect(done.results.map((r) => 'code' in r && r.code)).toEqual([
      'invalid',
      'invalid',
      'unknown_kind',
    ])
    expect(done.taken).toHaveLength(5)
  })

  it('[P5] refuses an op past 16 KB, NUL, half characters and deep nests without reading on', () => {
    const { device, known, jobId } = world()
    const big = device.op(adviceKeep(jobId, { words: 'x'.repeat(MAX_OP_BYTES) }))
    const nul = device.op(logAdd(device, jobId, note('a\0b')))
    const half = device.op(logAdd(device, jobId, note('a\ud83d')))
    const nest = device.op(adviceKeep(jobId, JSON.parse(`${'['.repeat(2000)}${']'.repeat(2000)}`)))
    const deep = {
      ...device.op(adviceKeep(jobId)),
      fields: JSON.parse(`${'['.repeat(200_000)}${']'.repeat(200_000)}`),
    }
    const done = plan([big, nul, half, nest, deep], known)
    expect(done.results.map((r) => 'code' in r && r.code)).toEqual([
      'too_big',
      'invalid',
      'invalid',
      'invalid',
      'too_big',
    ])
    expect(done.effects).toMatchObject({ entries: [], advice: [] })
  })

  it('[P5] marks the children of a refused op blocked, not lost', () => {
    const { device, known } = world()
    const opening = jobOpen(v7())
    const orphan = device.op(opening)
    const child = device.op(logAdd(device, opening.fields.id, note('below')))
    const done = plan([orphan, child], known)
    expect(done.results).toEqual([
      { opId: orphan.id, result: 'blocked', on: opening.fields.machineId },
      { opId: child.id, result: 'blocked', on: opening.fields.id },
    ])
    expect(done.taken).toEqual([])
  })

  it('[P5] takes a child sent before its parent in one batch', () => {
    const { device, known, machineId } = world()
    const opening = jobOpen(machineId)
    const child = device.op(logAdd(device, opening.fields.id, note('early')))
    const done = plan([child, device.op(opening)], known)
    expect(done.results).toEqual([])
    expect(done.effects.entries.map((entry) => entry.id)).toEqual([child.entityId])
  })

  it('[P4] tells of a seen op what was told then', () => {
    const { device, known, jobId } = world()
    const op = device.op(logAdd(device, jobId, note('again')))
    const raw = JSON.stringify(op)
    const seen = (outcome: Outcome) => ({ ...known, seen: new Map([[op.id, { raw, outcome }]]) })
    const accepted = plan([op], seen({ kind: 'accepted' }))
    expect(accepted).toMatchObject({
      taken: [op.id],
      results: [{ opId: op.id, result: 'duplicate' }],
      outcomes: [],
    })
    const refusal = {
      kind: 'rejected',
      code: 'stale_status',
      field: 'fields.from',
      detail: 'closed',
    } as const
    const { kind: _, ...told } = refusal
    expect(plan([op], seen(refusal)).results).toEqual([
      { opId: op.id, result: 'rejected', ...told },
    ])
    expect(accepted.effects.entries).toEqual([])
  })

  it('[P4] refuses another op under a used id, in one batch and later', () => {
    const { device, known, jobId } = world()
    const op = device.op(logAdd(device, jobId, note('first')))
    const other = { ...device.op(logAdd(device, jobId, note('second'))), id: op.id }
    const done = plan([op, op, other], known)
    expect(done.results).toEqual([
      { opId: op.id, result: 'duplicate' },
      { opId: op.id, result: 'rejected', code: 'id_reuse', field: 'id', detail: null },
    ])
    expect(done.effects.entries).toHaveLength(1)
    expect(done.taken).toEqual([op.id])
  })

  it('[P18] refuses an entry in another hand or of another device', () => {
    const { device, known, jobId } = world()
    const ops = [
      device.op(logAdd(device, jobId, note('x'), { authorId: v7() })),
      device.op(logAdd(device, jobId, note('x'), { deviceId: v7() })),
      { ...device.op(logAdd(device, jobId, note('x'))), dev: v7() },
    ]
    expect(plan(ops, known).results.map((r) => 'code' in r && r.code)).toEqual([
      'not_yours',
      'not_yours',
      'not_yours',
    ])
  })

  it('[R13] accepts a move once; the second from the same state is stale and says where it stands', () => {
    const { device, known, jobId } = world()
    const move = (to: 'underWay' | 'closed') =>
      device.op({
        kind: 'job.move',
        entityId: jobId,
        jobId,
        fields: { from: 'open', to, reason: null },
      })
    const done = plan([move('underWay'), move('closed')], known)
    expect(done.results).toMatchObject([
      { result: 'rejected', code: 'stale_status', detail: 'underWay' },
    ])
    expect(done.effects.changedJobs.get(jobId)?.state).toBe('underWay')
  })

  it('[R2] refuses a move that the state machine does not know', () => {
    const { device, known, jobId } = world()
    const op = device.op({
      kind: 'job.machine',
      entityId: jobId,
      jobId,
      fields: { from: 'stranded', to: 'atShop' },
    })
    expect(plan([op], known).results).toMatchObject([{ code: 'invalid', field: 'fields.to' }])
  })

  it('[R13] a job closed at the desk reopens when the field writes on, one closed here does not', () => {
    const { device, known, jobId, stand } = world()
    const closed: Known = { ...known, jobs: new Map([[jobId, { ...stand, state: 'closed' }]]) }
    const entry = () => device.op(logAdd(device, jobId, note('late')))
    const reopened = [{ jobId, what: 'job', from: 'closed', to: 'open' }]
    expect(plan([entry(), entry()], closed).effects.steps).toEqual(reopened)
    expect(plan([entry()], { ...closed, closedHere: new Set([jobId]) }).effects.steps).toEqual([])
    const own = device.op({
      kind: 'job.move',
      entityId: jobId,
      jobId,
      fields: { from: 'open', to: 'closed', reason: null },
    })
    expect(plan([own, entry()], known).effects.steps).toHaveLength(1)
  })
})

describe('the way out of a job', () => {
  const decided = (of: ReturnType<typeof world>, wayOut: WayOut, machineState: JobMachineState) =>
    logAdd(of.device, of.jobId, {
      kind: 'wayOut',
      wayOut,
      reasons: 'Dark',
      machineState,
      peopleState: 'onTheWay',
    })
  const correct = (of: ReturnType<typeof world>, id: string) =>
    of.device.op(
      logAdd(of.device, of.jobId, { kind: 'correction', reason: 'Wrong' }, { supersedes: id }),
    )

  it('[R8] is the last one that stands, in this batch and before it', () => {
    const w = world()
    const tow = decided(w, 'tow', 'onTow')
    const later = decided(w, 'returnLater', 'leftBehind')
    const standing = (ops: unknown[], known = w.known) =>
      plan(ops, known).effects.changedJobs.get(w.jobId)?.wayOut
    expect(standing([w.device.op(tow), w.device.op(later)])).toBe('returnLater')
    const taken = correct(w, later.fields.id)
    expect(standing([w.device.op(tow), w.device.op(later), taken])).toBe('tow')
    const known: Known = {
      ...w.known,
      jobs: new Map([[w.jobId, { ...w.stand, wayOut: 'tow' }]]),
      entries: new Map([[tow.fields.id, w.jobId]]),
      deciding: new Map([[tow.fields.id, tow.fields]]),
    }
    expect(standing([correct(w, tow.fields.id)], known)).toBeNull()
    expect(standing([w.device.op(logAdd(w.device, w.jobId, note('x')))], known)).toBeUndefined()
  })

  it('[R2] leaves a machine behind only with what that demands', () => {
    const w = world()
    const leave = () =>
      w.device.op({
        kind: 'job.machine',
        entityId: w.jobId,
        jobId: w.jobId,
        fields: { from: 'stranded', to: 'leftBehind' },
      })
    const photo = w.device.op(
      logAdd(w.device, w.jobId, {
        kind: 'photo',
        photo: { hash: 'a'.repeat(64), bytes: 9, mime: 'image/jpeg', width: 1, height: 1 },
        caption: null,
      }),
    )
    const way = w.device.op(decided(w, 'returnLater', 'leftBehind'))
    const place = {
      latitude: 47.1,
      longitude: -93.2,
      source: 'typed',
      accuracyMetres: null,
      at: '2026-11-24T18:40:00.000Z',
      asTyped: null,
      words: null,
    } as const
    const placed: Known = { ...w.known, jobs: new Map([[w.jobId, { ...w.stand, place }]]) }
    expect(plan([photo, way, leave()], placed).results).toEqual([])
    for (const [ops, known] of [
      [[leave()], placed],
      [[photo, leave()], placed],
      [[way, leave()], placed],
      [[photo, way, leave()], w.known],
    ] as const) {
      const refused = plan([...ops], known)
      expect(refused.results).toMatchObject([{ code: 'invalid', field: 'fields.to' }])
      expect(refused.effects.steps).toEqual([])
    }
  })
})

describe('old versions', () => {
  it('[P13] takes this protocol and the one before, asks older ones to update and newer ones to wait', () => {
    expect(takesProtocol(5, 5).ok).toBe(true)
    expect(takesProtocol(4, 5).ok).toBe(true)
    expect(takesProtocol(3, 5)).toEqual({ ok: false, problem: { kind: 'tooOld' } })
    expect(takesProtocol(6, 5)).toMatchObject({ ok: false, problem: { kind: 'tooNew' } })
    expect(takesProtocol(0, 1)).toEqual({ ok: false, problem: { kind: 'tooOld' } })
  })

  it('[fault 18] [P13] brings an op of every earlier shape up to date, one step at a time', () => {
    const steps = {
      1: (op: Readonly<Record<string, unknown>>) => ({ ...op, one: true }),
      2: (op: Readonly<Record<string, unknown>>) => ({ ...op, two: op.one }),
    }
    expect(upgradeOp({ schema: 1 }, 3, steps)).toEqual({ schema: 3, one: true, two: true })
    expect(upgradeOp({ schema: 2, one: 7 }, 3, steps)).toEqual({ schema: 3, one: 7, two: 7 })
    expect(upgradeOp({ schema: 4 }, 3, steps)).toBeNull()
  })

  it('[P13] asks to send an op of a newer shape again later and keeps nothing of it', () => {
    const { device, known, jobId } = world()
    const op = { ...device.op(logAdd(device, jobId, note('x'))), schema: 99 }
    const done = plan([op], known)
    expect(done).toMatchObject({
      taken: [],
      outcomes: [],
      results: [{ opId: op.id, result: 'retry' }],
    })
  })
})
