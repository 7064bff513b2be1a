import * as z from 'zod/mini'
import { id, slug } from './id'

/** What one person carries: parts by quantity and tools. Plans count only on what is in it (rule R25). */
export const bag = z.strictObject({
  id,
  personId: id,
  parts: z.array(
    z.strictObject({ part: slug, quantity: z.int().check(z.minimum(0)), knownGood: z.boolean() }),
  ),
  tools: z.array(slug),
  meterIds: z.array(id),
})
export type Bag = z.infer<typeof bag>
