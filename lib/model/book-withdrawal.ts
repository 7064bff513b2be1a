import * as z from 'zod/mini'
import { id, slug } from './id'
import { instant } from './time'

/**
 * A safety withdrawal from the code book (rule R23): a check, a swap, a fault or the book's own limit of a check, or
 * a whole version. It holds in every version that has the same content, also for jobs that hold an older one.
 */
export const WITHDRAWN = ['check', 'swap', 'fault', 'limit', 'version'] as const
export const withdrawn = z.enum(WITHDRAWN)
export type Withdrawn = z.infer<typeof withdrawn>

const version = z.int().check(z.minimum(1))

export const bookWithdrawal = z.object({
  id,
  what: withdrawn,
  /** The item it is about; of a limit, the check that had it; null for a whole version. */
  itemId: z.nullable(slug),
  /** What it is called in the book. */
  name: z.string(),
  /** Why, and what to do instead, in the words of who withdrew it. */
  reason: z.string(),
  instead: z.nullable(z.string()),
  at: z.string(),
  by: z.nullable(id),
  /** Versions in which it holds, of those up to `upTo`; in a later one it holds until the shop has said. */
  versions: z.array(version),
  upTo: z.int(),
  /** Who has acknowledged it, and when. */
  heard: z.array(z.object({ personId: id, at: z.string() })),
})
export type BookWithdrawal = z.infer<typeof bookWithdrawal>

const reason = z.string().check(z.trim(), z.minLength(3), z.maxLength(500))

/** What the owner asks: an item of the newest version by its id, or a version by its number. */
export const withdrawForm = z.discriminatedUnion('what', [
  z.strictObject({
    what: z.enum(['check', 'swap', 'fault', 'limit']),
    itemId: slug,
    reason,
    instead: z.nullable(reason),
  }),
  z.strictObject({ what: z.literal('version'), version, reason, instead: z.nullable(reason) }),
])
export type WithdrawForm = z.infer<typeof withdrawForm>

/** That somebody acknowledged a withdrawal, as the phone says it. */
export const bookHeard = z.strictObject({ withdrawalId: id, at: instant })
