import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { FIRST_HLC, nextHlc } from '@/lib/sync/protocol/hlc'
import { OP_SCHEMA, type Op, type OpInput } from '@/lib/sync/protocol/op'
import { type PhoneDb, readMeta, rowKey } from './phone-db'

/** The phone's clock put right by the last offset the shop measured (sync.md 3.4). */
export class CorrectedClock {
  readonly #ports: SyncPorts
  #offsetMs = 0

  constructor(ports: SyncPorts) {
    this.#ports = ports
  }

  set offsetMs(offset: number) {
    this.#offsetMs = offset
  }

  /** Corrected time in ms since 1970. */
  now(): number {
    return this.#ports.clock.now() + this.#offsetMs
  }

  instant(): Instant {
    return new Date(this.now()).toISOString()
  }
}

type Counter = { dseq: number; hlc: string }

/** The last op number and stamp given out by this store. */
export const readCounter = async (db: PhoneDb): Promise<Counter> =>
  (await readMeta(db, 'stamp')) ?? { dseq: 0, hlc: FIRST_HLC }

/** Ops stamped with id, device, number and clock, and the counter after them. */
export async function stampOps(of: {
  db: PhoneDb
  inputs: readonly OpInput[]
  ids: readonly Id[]
  deviceId: Id
  nowMs: number
}): Promise<{ ops: Op[]; counter: Counter }> {
  let counter = await readCounter(of.db)
  const ops: Op[] = []
  const places = of.inputs.map(placeOf)
  const rows = await of.db.row.bulkGet(places.map((at) => rowKey(at.entity, at.entityId)))
  for (const [index, input] of of.inputs.entries()) {
    counter = { dseq: counter.dseq + 1, hlc: nextHlc(counter.hlc, of.nowMs) }
    const place = placeOf(input)
    const head = {
      id: of.ids[index] ?? '',
      dev: of.deviceId,
      ...counter,
      entityId: place.entityId,
      jobId: place.jobId,
      base: rows[index]?.seq ?? null,
      schema: OP_SCHEMA,
    }
    ops.push({ ...head, kind: input.kind, fields: input.fields } as Op)
  }
  return { ops, counter }
}

/** An op that adds something goes by the id of what it adds (P2); undefined for every other. */
export function opIdOf(input: OpInput): Id | undefined {
  switch (input.kind) {
    case 'machine.add':
    case 'job.open':
    case 'log.add':
    case 'partRequest.ask':
    case 'advice.keep':
      return input.fields.id
    default:
      return undefined
  }
}

function placeOf(input: OpInput): { entity: string; entityId: Id; jobId: Id | null } {
  switch (input.kind) {
    case 'machine.add':
      return { entity: 'machine', entityId: input.fields.id, jobId: null }
    case 'job.open':
      return { entity: 'job', entityId: input.fields.id, jobId: input.fields.id }
    case 'job.move':
    case 'job.people':
    case 'job.machine':
    case 'job.set':
    case 'job.settle':
      return { entity: 'job', entityId: input.jobId, jobId: input.jobId }
    case 'log.add':
      return { entity: 'logEntry', entityId: input.fields.id, jobId: input.fields.jobId }
    case 'partRequest.ask':
      return { entity: 'partRequest', entityId: input.fields.id, jobId: input.fields.jobId }
    case 'advice.keep':
      return { entity: 'advice', entityId: input.fields.id, jobId: input.fields.jobId }
    case 'machine.set':
    case 'machine.settle':
    case 'machine.drop':
      return { entity: 'machine', entityId: input.machineId, jobId: null }
    case 'partLine.add':
    case 'partLine.cancel':
    case 'partLine.quantity':
      return { entity: 'partRequest', entityId: input.fields.requestId, jobId: input.jobId }
    case 'partRequest.drop':
      return { entity: 'partRequest', entityId: input.requestId, jobId: input.jobId }
    case 'book.heard':
      return { entity: 'bookWithdrawal', entityId: input.fields.withdrawalId, jobId: null }
  }
}
