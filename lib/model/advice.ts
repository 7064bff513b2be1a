import * as z from 'zod/mini'
import { id } from './id'
import { instant } from './time'

/** A recommendation a person acted on or overrode, kept so that it can be recomputed to the same values (rule R23). */
export const advice = z.strictObject({
  id,
  jobId: id,
  at: instant,
  engineVersion: z.string(),
  bookVersion: z.int(),
  /** The engine's own input and answer, as plain data. */
  inputs: z.unknown(),
  shown: z.unknown(),
  acted: z.enum(['followed', 'overridden']),
  chose: z.string().check(z.maxLength(80)),
  reason: z.nullable(z.string().check(z.maxLength(500))),
})
export type Advice = z.infer<typeof advice>
