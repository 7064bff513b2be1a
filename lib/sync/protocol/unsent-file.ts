import * as z from 'zod/mini'
import { id, sha256Hex } from '@/lib/model/id'

/**
 * The file in which unsent work leaves a phone by hand (P23) and comes in at the desk (IM1). It stands
 * open: whoever holds it can read it, also when the phone is gone. It is signed by the phone's key, so
 * that not one letter of it can be changed unseen. `body` is the JSON of `unsentBody` as text, exactly
 * as it was signed.
 */
export const UNSENT_FORMAT = 'farbench-unsent-2'

/** Most bytes of one file; a phone that holds more makes several. */
export const MAX_FILE_BYTES = 32 * 1024 * 1024
/** Most records and photos of one file. */
export const MAX_FILE_OPS = 5_000
const MAX_FILE_PHOTOS = 200
/** Most photo bytes a phone puts in one file: base64 adds a third, records and frame the rest. */
export const PHOTO_BYTES_A_FILE = 18 * 1024 * 1024

export const unsentFile = z.strictObject({
  format: z.literal(UNSENT_FORMAT),
  shop: id,
  person: id,
  device: id,
  /** When it was made, by the phone's corrected clock. */
  at: z.iso.datetime(),
  body: z.string(),
  /** ECDSA P-256 with SHA-256, raw r||s, base64url, over `fileText`. */
  signature: z.string().check(z.regex(/^[A-Za-z0-9_-]{86}$/)),
})
export type UnsentFile = z.infer<typeof unsentFile>

/** Where the phone had the record: `letGo` is what its person has given up sending. */
const heldAs = z.enum(['waiting', 'blocked', 'stuck', 'letGo'])

export const unsentBody = z.object({
  ops: z
    .array(
      z.object({
        state: heldAs,
        reason: z.nullable(z.string()),
        since: z.iso.datetime(),
        /** Kept as it is: each op is read on its own, as in a push. */
        op: z.unknown(),
      }),
    )
    .check(z.maxLength(MAX_FILE_OPS)),
  photos: z
    .array(
      z.object({
        hash: sha256Hex,
        jobId: id,
        mime: z.string().check(z.maxLength(60)),
        since: z.iso.datetime(),
        /** Null when the phone no longer holds the bytes. */
        base64: z.nullable(z.string()),
      }),
    )
    .check(z.maxLength(MAX_FILE_PHOTOS)),
})
export type UnsentBody = z.infer<typeof unsentBody>

/** The text the phone signs. Its first line keeps it apart from that of a push or an upload. */
export function fileText(of: {
  shop: string
  person: string
  device: string
  at: string
  bodyHash: string
}): string {
  return ['farbench-unsent-file-2', of.shop, of.person, of.device, of.at, of.bodyHash].join('\n')
}

const outcome = z.enum(['new', 'taken', 'quarantined', 'already', 'refused', 'blocked', 'later'])
/** What the desk hears of a file: of each record what it is, and what became of it. */
export const importAnswer = z.object({
  person: z.object({ id, name: z.nullable(z.string()) }),
  device: z.object({ id, name: z.string() }),
  madeAt: z.string(),
  /** Why what is in it waits for the owner's word (IM4); null when it is taken as a push would be. */
  quarantine: z.nullable(z.enum(['deviceRevoked', 'membershipEnded'])),
  /** False while it was only looked at. */
  applied: z.boolean(),
  ops: z.array(
    z.object({
      opId: z.string(),
      kind: z.string(),
      /** Kind of the log entry, of a `log.add`. */
      entry: z.nullable(z.string()),
      jobId: z.nullable(z.string()),
      since: z.string(),
      heldAs,
      outcome,
      /** Code of a refusal, id of what a blocked one waits for. */
      code: z.nullable(z.string()),
      detail: z.nullable(z.string()),
    }),
  ),
  photos: z.array(
    z.object({
      hash: z.string(),
      jobId: z.string(),
      since: z.string(),
      bytes: z.int(),
      outcome,
      code: z.nullable(z.string()),
    }),
  ),
})
export type ImportAnswer = z.infer<typeof importAnswer>
export type ImportOutcome = z.infer<typeof outcome>
