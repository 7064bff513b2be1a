import * as z from 'zod/mini'
import { slug } from './id'

/** How sure the cause of a closed job is (rule R25). Proved: by swap and back, or the broken part seen. */
export const CAUSE_GRADES = ['proved', 'likely', 'unknown', 'noFaultFound'] as const
export const causeGrade = z.enum(CAUSE_GRADES)
export type CauseGrade = z.infer<typeof causeGrade>

/** The cause: a fault of the code book, or in the closer's own words. */
export const cause = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('fault'), fault: slug }),
  z.strictObject({
    kind: z.literal('words'),
    words: z.string().check(z.trim(), z.minLength(1), z.maxLength(300)),
  }),
])

/** What closing a job says; `cause` is null when it is unknown or no fault was found. */
export const closing = z.strictObject({
  cause: z.nullable(cause),
  grade: causeGrade,
  reason: z.string().check(z.trim(), z.minLength(1), z.maxLength(500)),
})
export type Closing = z.infer<typeof closing>
