import * as z from 'zod/mini'
import { id } from './id'
import { place } from './place'
import { instant } from './time'

/**
 * Single values of a job or a machine that change after it was written. Each is written on its own; of
 * two written without knowing of each other the later one stands, and the other is kept and shown
 * (docs/spec/sync.md, M1 to M5).
 */
export const jobSetting = z.discriminatedUnion('field', [
  z.strictObject({
    field: z.literal('complaintWords'),
    value: z.string().check(z.minLength(1), z.maxLength(500)),
  }),
  z.strictObject({ field: z.literal('place'), value: place }),
  z.strictObject({
    field: z.literal('airTempC'),
    value: z.nullable(z.number().check(z.minimum(-60), z.maximum(60))),
  }),
  z.strictObject({
    field: z.literal('weather'),
    value: z.nullable(z.string().check(z.maxLength(120))),
  }),
])
export type JobSetting = z.infer<typeof jobSetting>

export const machineSetting = z.discriminatedUnion('field', [
  z.strictObject({
    field: z.literal('hours'),
    value: z.nullable(z.number().check(z.minimum(0), z.maximum(999_999))),
  }),
  z.strictObject({
    field: z.literal('unitNumber'),
    value: z.nullable(z.string().check(z.maxLength(20))),
  }),
  z.strictObject({
    field: z.literal('serial'),
    value: z.nullable(z.string().check(z.maxLength(30))),
  }),
  z.strictObject({
    field: z.literal('year'),
    value: z.nullable(z.int().check(z.minimum(1950), z.maximum(2100))),
  }),
])
export type MachineSetting = z.infer<typeof machineSetting>

/**
 * A value that did not stand and that nobody has looked at yet. `id` names it in the history; `clockOdd`:
 * the phone that wrote it had a clock ahead of the shop's. Loose in field and value, so that a row is
 * still read when a later version knows more fields.
 */
export const alsoEntered = z.object({
  id,
  field: z.string(),
  value: z.unknown(),
  by: z.nullable(id),
  at: instant,
  clockOdd: z.boolean(),
})
export type AlsoEntered = z.infer<typeof alsoEntered>

/** Fields a life may hang on: what lost stays on show until somebody has looked at it. */
export const SAFETY_FIELDS: ReadonlySet<string> = new Set<JobSetting['field']>(['place'])
