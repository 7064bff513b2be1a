import * as z from 'zod/mini'
import { advice } from '@/lib/model/advice'
import { bookHeard } from '@/lib/model/book-withdrawal'
import { id } from '@/lib/model/id'
import { jobMachineState, jobOpening, jobState, peopleState } from '@/lib/model/job'
import { logEntry } from '@/lib/model/log-entry'
import { machine } from '@/lib/model/machine'
import { partLine, partRequest } from '@/lib/model/part-request'
import { jobSetting, machineSetting } from '@/lib/model/setting'

/** Hybrid logical clock as text that sorts: 12 hex digits of ms since 1970, 4 hex digits of counter (sync.md 3.4). */
export const hlc = z.string().check(z.regex(/^[0-9a-f]{12}-[0-9a-f]{4}$/))

/** What every op carries besides its fields (P2). `base` is the change number the device had seen of the entity. */
const head = {
  id,
  dev: id,
  dseq: z.int().check(z.minimum(1)),
  hlc,
  entityId: id,
  jobId: z.nullable(id),
  base: z.nullable(z.int()),
  schema: z.int(),
}

/** What somebody has looked at: ids of values that did not stand. */
const looked = z.strictObject({
  history: z.array(id).check(z.minLength(1), z.maxLength(40)),
})
const nothing = z.strictObject({})

/** Every write a field device can make. Push parses it strictly; one bad op costs only itself (P5). */
export const op = z.discriminatedUnion('kind', [
  z.strictObject({ ...head, kind: z.literal('machine.add'), fields: machine }),
  z.strictObject({ ...head, kind: z.literal('job.open'), fields: jobOpening }),
  z.strictObject({
    ...head,
    kind: z.literal('job.move'),
    fields: z.strictObject({
      from: jobState,
      to: jobState,
      reason: z.nullable(z.string().check(z.maxLength(500))),
    }),
  }),
  z.strictObject({
    ...head,
    kind: z.literal('job.people'),
    fields: z.strictObject({ from: peopleState, to: peopleState }),
  }),
  z.strictObject({
    ...head,
    kind: z.literal('job.machine'),
    fields: z.strictObject({ from: jobMachineState, to: jobMachineState }),
  }),
  z.strictObject({ ...head, kind: z.literal('log.add'), fields: logEntry }),
  z.strictObject({ ...head, kind: z.literal('partRequest.ask'), fields: partRequest }),
  z.strictObject({ ...head, kind: z.literal('advice.keep'), fields: advice }),
  // Since schema 2. Single values; `base` says what the writer had seen of the row.
  z.strictObject({ ...head, kind: z.literal('job.set'), fields: jobSetting }),
  z.strictObject({ ...head, kind: z.literal('machine.set'), fields: machineSetting }),
  z.strictObject({ ...head, kind: z.literal('job.settle'), fields: looked }),
  z.strictObject({ ...head, kind: z.literal('machine.settle'), fields: looked }),
  // Lines of a part request: a set with counters. The entity is the request.
  z.strictObject({
    ...head,
    kind: z.literal('partLine.add'),
    fields: z.strictObject({ requestId: id, line: partLine }),
  }),
  z.strictObject({
    ...head,
    kind: z.literal('partLine.cancel'),
    fields: z.strictObject({ requestId: id, lineId: id }),
  }),
  z.strictObject({
    ...head,
    kind: z.literal('partLine.quantity'),
    fields: z.strictObject({
      requestId: id,
      lineId: id,
      by: z.int().check(z.minimum(-999), z.maximum(999)),
    }),
  }),
  // Rows made by mistake.
  z.strictObject({ ...head, kind: z.literal('partRequest.drop'), fields: nothing }),
  z.strictObject({ ...head, kind: z.literal('machine.drop'), fields: nothing }),
  // Since schema 3. The entity is the withdrawal from the code book.
  z.strictObject({ ...head, kind: z.literal('book.heard'), fields: bookHeard }),
])
export type Op = z.infer<typeof op>
export type OpKind = Op['kind']
/** Ops whose fields do not name the job, the machine or the request they are about: the op input does. */
export type MoveKind = 'job.move' | 'job.people' | 'job.machine'
export type JobKind = MoveKind | 'job.set' | 'job.settle'
export type MachineKind = 'machine.set' | 'machine.settle' | 'machine.drop'
export type LineKind = 'partLine.add' | 'partLine.cancel' | 'partLine.quantity'
type Named<K extends OpKind> = K extends JobKind | LineKind
  ? { jobId: string }
  : K extends MachineKind
    ? { machineId: string }
    : K extends 'partRequest.drop'
      ? { jobId: string; requestId: string }
      : unknown
/** Kind and fields of an op, before the device stamps it. */
export type OpInput = {
  [K in OpKind]: { kind: K; fields: Extract<Op, { kind: K }>['fields'] } & Named<K>
}[OpKind]

/**
 * Version of the op shapes; the server takes every earlier one (P13). Schema 2 added the kinds from
 * `job.set` on, schema 3 `book.heard`; the kinds before kept their shapes.
 */
export const OP_SCHEMA = 3
