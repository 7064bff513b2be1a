import * as z from 'zod/mini'
import { id } from './id'
import { logEntry } from './log-entry'

/** The owner's list of phones, as the desk reads it. Unknown fields are ignored. */
const count = z.int().check(z.minimum(0))

/** Something of a phone that lies in quarantine (R22), and the owner's word on it. */
export const quarantined = z.object({
  opId: z.string(),
  /** Kind of the op; `file` for a photo or voice note by itself; `refused` or `later` when it cannot be read. */
  kind: z.string(),
  dseq: z.int(),
  jobId: z.nullable(z.string()),
  /** Number and complaint of the job, as far as the shop knows it. */
  jobWords: z.nullable(z.string()),
  /** When the phone says it was recorded. */
  recordedAt: z.nullable(z.string()),
  receivedAt: z.string(),
  why: z.enum(['deviceRevoked', 'membershipEnded']),
  /** What was written, when it is an entry of the job log that this version reads. */
  entry: z.nullable(logEntry),
  /** A photo or voice note that it names: in quarantine with it, or still on the phone. */
  file: z.nullable(z.object({ hash: z.string(), here: z.boolean() })),
  decision: z.nullable(z.enum(['accepted', 'refused'])),
  reason: z.nullable(z.string()),
  decidedAt: z.nullable(z.string()),
})
export type Quarantined = z.infer<typeof quarantined>

export const deskPhone = z.object({
  id,
  /** What kind of phone it calls itself. */
  words: z.string(),
  person: z.object({ id, name: z.nullable(z.string()), isMember: z.boolean() }),
  enrolledAt: z.string(),
  lastSeenAt: z.nullable(z.string()),
  /** Phone's clock less the shop's. */
  clockOffsetMs: z.nullable(z.int()),
  /** What it told that it still holds; null when it never told. */
  held: z.nullable(
    z.object({ ops: count, photos: count, oldestAt: z.nullable(z.string()), toldAt: z.string() }),
  ),
  /** The newest version of the code book it holds, as it told; null when it never told. */
  bookVersion: z.nullable(z.int()),
  /** Numbers of it that never came, by what came after them (P22). */
  missing: count,
  revoked: z.nullable(z.object({ at: z.string(), reason: z.nullable(z.string()) })),
  wipeToldAt: z.nullable(z.string()),
  /** Its store is gone: when that was seen, and what went with it (P22). */
  gone: z.nullable(
    z.object({
      at: z.string(),
      lostOps: count,
      deletedOps: count,
      lastOn: z.nullable(z.string()),
    }),
  ),
  items: z.array(quarantined),
})
export type DeskPhone = z.infer<typeof deskPhone>

export const deskPhones = z.object({ phones: z.array(deskPhone) })
export type DeskPhones = z.infer<typeof deskPhones>

const reason = z.string().check(z.trim(), z.minLength(1), z.maxLength(500))

/** POST /api/desk/phones/[id]/revoke. */
export const revokeForm = z.strictObject({ phoneId: id, reason })
export type RevokeForm = z.infer<typeof revokeForm>

/** POST /api/desk/phones/[id]/decide: one item, or all of this phone that wait. */
export const decideForm = z.discriminatedUnion('decision', [
  z.strictObject({
    decision: z.literal('accept'),
    phoneId: id,
    opId: z.nullable(z.string().check(z.maxLength(80))),
  }),
  z.strictObject({
    decision: z.literal('refuse'),
    phoneId: id,
    opId: z.nullable(z.string().check(z.maxLength(80))),
    reason,
  }),
])
export type DecideForm = z.infer<typeof decideForm>

/** What became of each item that was decided on. */
export const decided = z.object({
  opId: z.string(),
  is: z.enum(['accepted', 'refused', 'left']),
  file: z.optional(z.enum(['none', 'in', 'notHere', 'refused'])),
  code: z.optional(z.string()),
  detail: z.optional(z.nullable(z.string())),
})
export const decidedAnswer = z.object({ decided: z.array(decided) })
export type DecidedAnswer = z.infer<typeof decidedAnswer>
