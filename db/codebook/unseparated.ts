import * as z from 'zod/mini'
import { slug } from '@/lib/model/id'
import { sentence } from '@/lib/model/sentence'

/** Two faults that no check or swap of the book tells apart, and why that is left so (rule CB11). */
export type Unseparated = { faults: readonly [string, string]; reason: string }

/** The same as it comes from a file. */
export const unseparatedPair = z.strictObject({
  faults: z.tuple([slug, slug]),
  reason: sentence,
})
