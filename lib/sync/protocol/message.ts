import * as z from 'zod/mini'
import { id } from '@/lib/model/id'

/** Version of the messages; the server takes this one and the one before (P13). */
export const PROTOCOL = 2
export const MAX_OPS = 500
export const MAX_OP_BYTES = 16_384
export const MAX_INFLATED_BYTES = 8 * 1024 * 1024
export const PAGE_ROWS = 500

const count = z.int().check(z.minimum(0))

/** Where a device stands in its shop's change log (P12). `seq` is the shop's dense change number. */
export const cursor = z.strictObject({
  epoch: z.string(),
  shop: id,
  scopeVersion: z.int(),
  seq: z.int().check(z.minimum(0)),
})
export type Cursor = z.infer<typeof cursor>

/**
 * One POST /api/sync. Body: gzip of this JSON. Headers, all of them signed together with the body:
 * `x-farbench-shop`, `x-farbench-person`, `x-farbench-device`, `x-farbench-dseq` (`first-last` or `-`),
 * `x-farbench-signature` = base64url of ECDSA P-256 (r||s) over `${shop}\n${person}\n${device}\n${dseq}\n${base64url sha256(body as sent)}`.
 */
export const syncRequest = z.object({
  protocol: z.int(),
  schema: z.int(),
  /** Client clock when sent, for the offset the answer carries. */
  clientTime: z.string(),
  /** Kept as they are: each op is parsed on its own so that one bad op costs only itself. */
  ops: z.array(z.unknown()).check(z.maxLength(MAX_OPS)),
  cursor: z.nullable(cursor),
  /** False when the device only pushes (a worker without a session). */
  pull: z.boolean(),
  /** Since protocol 2: what the phone still holds beyond this batch, so that the desk can say so. */
  held: z.optional(
    z.nullable(
      z.object({
        ops: count,
        photos: count,
        oldestAt: z.nullable(z.string().check(z.maxLength(40))),
      }),
    ),
  ),
  /** Since protocol 2: the id written when this phone's store was made (P22). */
  canary: z.optional(z.nullable(id)),
  /** Which version of the code book the phone holds. */
  book: z.optional(z.nullable(z.int().check(z.minimum(1), z.maximum(2_147_483_647)))),
  /**
   * Since protocol 2: the answer may leave out what the phone has just said (brief.ts) and never reads; the
   * ops here, and rows there, what is said beside them (short.ts).
   */
  brief: z.optional(z.boolean()),
})
export type SyncRequest = z.infer<typeof syncRequest>

/** Why an op was refused for good; the phone shows the sentence for the code and keeps the op (P16). */
export const REJECT_CODES = [
  'invalid',
  'too_big',
  'unknown_kind',
  'id_reuse',
  'no_parent',
  'forbidden',
  'stale_status',
  'not_yours',
] as const

/** Only what is not simply accepted is itemised (P5). `merged`: taken, and `loser` is what did not stand (M2). */
export const opResult = z.discriminatedUnion('result', [
  z.object({ opId: z.string(), result: z.literal('duplicate') }),
  z.object({ opId: z.string(), result: z.literal('merged'), loser: z.unknown() }),
  z.object({
    opId: z.string(),
    result: z.literal('rejected'),
    code: z.enum(REJECT_CODES),
    field: z.nullable(z.string()),
    detail: z.nullable(z.string()),
  }),
  /** Waits for a parent that has not landed. */
  z.object({ opId: z.string(), result: z.literal('blocked'), on: z.nullable(z.string()) }),
  z.object({ opId: z.string(), result: z.literal('retry') }),
])
export type OpResult = z.infer<typeof opResult>

/**
 * One row of a pull, in change order. `entity` is shop, person, machineModel, machine, meterProfile, bag, job,
 * logEntry, partRequest, photo, book (only that a new version is published) or bookWithdrawal; others are
 * ignored.
 * `evict`: it left this person's scope; `deleted`: a tombstone. */
export const pullRow = z.object({
  seq: z.int(),
  entity: z.string(),
  id: z.string(),
  jobId: z.nullable(z.string()),
  state: z.enum(['present', 'deleted', 'evict']),
  row: z.unknown(),
})
/** `own`: put together on the phone from the op it sent (brief.ts); never travels. */
export type PullRow = z.infer<typeof pullRow> & { own?: true }

/**
 * Rows of entries that this request's own ops added, in short (brief.ts): of `count` ops from number `dseq`
 * on, the first has change number `seq` and place `order` in its job's chain, each further one the next.
 */
const ownRun = z.object({
  dseq: z.int(),
  seq: z.int(),
  order: z.int(),
  count: z.int(),
  receivedAt: z.string(),
})
export type OwnRun = z.infer<typeof ownRun>

export const pullAnswer = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('page'),
    rows: z.array(pullRow),
    own: z.optional(z.array(ownRun)),
    cursor,
    more: z.boolean(),
  }),
  /** The cursor is of another epoch, shop or scope, or older than the tombstones kept: drop pulled rows, keep the outbox, start at seq 0. */
  z.object({ kind: z.literal('reset'), cursor }),
  z.object({ kind: z.literal('signIn') }),
  z.object({ kind: z.literal('notAsked') }),
])
export type PullAnswer = z.infer<typeof pullAnswer>

export const syncResponse = z.object({
  protocol: z.int(),
  serverTime: z.string(),
  /** Highest op accepted or refused in this request by device sequence; results list the exceptions. */
  taken: z.array(z.string()),
  /** The same by their numbers, `[first, last]` each, to a phone that asked for a brief answer. */
  takenNumbers: z.optional(z.array(z.tuple([z.int(), z.int()]))),
  results: z.array(opResult),
  pull: pullAnswer,
  /** Since protocol 2. `wipe`: this phone was revoked and all it sent is in quarantine; it empties itself. */
  order: z._default(z.enum(['none', 'wipe']), 'none'),
  /** Since protocol 2: holes in this device's numbers that the shop never saw, `[first, last]` each (P22). */
  missing: z._default(z.array(z.tuple([z.int(), z.int()])), []),
  /** Since protocol 2: what an emptied store lost, as far as the shop can tell (P22). */
  lost: z._default(z.nullable(z.object({ ops: z.int(), lastAt: z.nullable(z.string()) })), null),
  /** To a store that begins anew: other phones of its person that fell silent with unsent work (P22). */
  silent: z.optional(
    z.object({ phones: z.int(), ops: z.int(), photos: z.int(), lastAt: z.string() }),
  ),
})
export type SyncResponse = z.infer<typeof syncResponse>
