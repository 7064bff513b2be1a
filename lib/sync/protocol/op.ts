import * as z from 'zod/mini'
import { advice } from '@/lib/model/advice'
import { id } from '@/lib/model/id'
import { jobMachineState, jobOpening, jobState, peopleState } from '@/lib/model/job'
import { logEntry } from '@/lib/model/log-entry'
import { machine } from '@/lib/model/machine'
import { partRequest } from '@/lib/model/part-request'

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
])
export type Op = z.infer<typeof op>
export type OpKind = Op['kind']
/** Moves of a job: their fields do not name the job, so the op input does. */
export type MoveKind = 'job.move' | 'job.people' | 'job.machine'
/** Kind and fields of an op, before the device stamps it. */
export type OpInput = {
  [K in OpKind]: { kind: K; fields: Extract<Op, { kind: K }>['fields'] } & (K extends MoveKind
    ? { jobId: string }
    : unknown)
}[OpKind]

/** Version of the op shapes; the server takes this one and the one before. */
export const OP_SCHEMA = 1
