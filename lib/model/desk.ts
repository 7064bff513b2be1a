import * as z from 'zod/mini'
import { id } from './id'
import { job } from './job'
import { logRow } from './log-entry'
import { machineRow } from './machine'
import { machineModel } from './machine-model'
import { partLine, partLineState, partRequest, partRequestRow } from './part-request'
import { person } from './person'
import { photoRow } from './photo'
import { shop } from './shop'

/**
 * What the desk reads: three answers, each whole as of change number `seq` of the shop. Unknown
 * fields are ignored, so that an open desk survives a newer server.
 */
const seq = z.int().check(z.minimum(0))

/** A job on the board: the job itself and what the shop has heard about it. */
export const boardJob = z.object({
  job,
  /** The machine in words: maker, model and unit number, as far as known. */
  machineWords: z.string(),
  /** Server time of closing; null while it is not closed. */
  closedAt: z.nullable(z.string()),
  entries: z.int(),
  /** Server time at which the last entry from the field came in. */
  heardAt: z.nullable(z.string()),
  /** Photos and voice notes that entries name and whose bytes are not here. */
  photosMissing: z.int(),
  partsOpen: z.int(),
})
export type BoardJob = z.infer<typeof boardJob>

export const deskBoard = z.object({
  seq,
  whose: z.enum(['all', 'own']),
  open: z.array(boardJob),
  /** Closed within the last 24 hours of the server's clock, newest first. */
  closed: z.array(boardJob),
})
export type DeskBoard = z.infer<typeof deskBoard>

/** One job with everything the shop holds of it. */
export const deskJob = z.object({
  seq,
  shop,
  job,
  machineWords: z.string(),
  /** Server time at which a phone that wrote into this job last reached us. */
  reachedAt: z.nullable(z.string()),
  machine: z.nullable(machineRow),
  model: z.nullable(machineModel),
  entries: z.array(logRow),
  photos: z.array(photoRow),
  /** The phones that wrote into this job, and when each last reached us: what is missing is on them. */
  phones: z.array(z.object({ id, name: z.string(), reachedAt: z.nullable(z.string()) })),
  parts: z.array(partRequestRow),
  /** Jobs that were merged into this one (R13), the earliest merge first. */
  merged: z._default(
    z.array(z.object({ id, number: z.string(), words: z.string(), mergedAt: z.string() })),
    [],
  ),
  /** Everyone of the shop, for names and for assigning. */
  people: z.array(person),
})
export type DeskJob = z.infer<typeof deskJob>

/** One line of a part request as a row of the parts desk's table. */
export const deskPartLine = z.object({
  line: z.object({ ...partLine.shape, state: partLineState }),
  request: z.pick(z.object(partRequest.shape), {
    id: true,
    jobId: true,
    askedAt: true,
    urgency: true,
    note: true,
    advice: true,
  }),
  askedBy: z.nullable(z.string()),
  jobNumber: z.nullable(z.string()),
  complaint: z.string(),
  machineWords: z.string(),
})
export type DeskPartLine = z.infer<typeof deskPartLine>

export const deskParts = z.object({ seq, currency: z.string(), lines: z.array(deskPartLine) })
export type DeskParts = z.infer<typeof deskParts>
