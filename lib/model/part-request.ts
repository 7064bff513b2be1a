import * as z from 'zod/mini'
import { id, slug } from './id'
import { money } from './money'
import { instant } from './time'

/** Steps of a part line, by quantity (rule R14). */
export const PART_LINE_STATES = [
  'asked',
  'identified',
  'quoted',
  'ordered',
  'promised',
  'received',
  'allocated',
  'dispatched',
  'fitted',
  'returned',
  'credited',
  'cancelled',
] as const
export const partLineState = z.enum(PART_LINE_STATES)
export type PartLineState = z.infer<typeof partLineState>

export const partLine = z.strictObject({
  id,
  part: slug,
  words: z.string().check(z.minLength(1), z.maxLength(120)),
  position: z.nullable(z.string().check(z.maxLength(60))),
  quantity: z.int().check(z.minimum(1), z.maximum(999)),
  choice: z.enum(['genuine', 'aftermarket', 'either']),
  number: z.nullable(z.string().check(z.maxLength(40))),
  price: z.nullable(money),
  /** The entry that condemned the old part. */
  condemnedBy: z.nullable(id),
})

/** What the field asks the parts desk for. */
export const partRequest = z.strictObject({
  id,
  jobId: id,
  askedAt: instant,
  urgency: z.enum(['now', 'today', 'thisWeek']),
  note: z.nullable(z.string().check(z.maxLength(500))),
  lines: z.array(partLine).check(z.minLength(1), z.maxLength(40)),
  /** The sum shown when it was asked: break-even failure chance of the aftermarket part (0 to 1), and the advice. */
  advice: z.nullable(
    z.strictObject({
      genuineMinor: z.int(),
      aftermarketMinor: z.int(),
      recoveryMinor: z.int(),
      genuineFails: z.number(),
      aftermarketFails: z.nullable(z.number()),
      breakEven: z.number(),
      advised: z.enum(['genuine', 'aftermarket', 'equal', 'noFigure']),
    }),
  ),
})
export type PartRequest = z.infer<typeof partRequest>
export type PartLine = z.infer<typeof partLine>

/** As it comes back from the shop. */
export const partRequestRow = z.object({
  ...partRequest.shape,
  askedBy: id,
  /** It was taken back and written into meanwhile, so it stands again. */
  revived: z.optional(z.boolean()),
  /** On the phone alone: taken back there, and the shop has not said so yet. */
  takenBack: z.optional(z.boolean()),
  lines: z.array(z.object({ ...partLine.shape, state: partLineState })),
})
export type PartRequestRow = z.infer<typeof partRequestRow>
