import * as z from 'zod/mini'
import { bookWithdrawal } from '@/lib/model/book-withdrawal'
import { sha256Hex } from '@/lib/model/id'

/**
 * What `GET /api/codebook?from=HASH` answers to a phone that holds the version of that hash: what changed since.
 * Items are named `kind:id`. The new order is the old one without what is dropped, put or moved; then each of
 * the others is set in at its place (from 0), in the order of the places.
 */
const place = z.int().check(z.minimum(0))
export const bookPatch = z.object({
  version: z.int().check(z.minimum(1)),
  /** SHA-256 of the canonical JSON of all items, as the new version carries it. */
  hash: sha256Hex,
  publishedAt: z.string(),
  from: sha256Hex,
  drop: z.array(z.string()),
  put: z.array(z.tuple([place, z.looseObject({ kind: z.string(), id: z.string() })])),
  move: z.array(z.tuple([place, z.string()])),
})
export type BookPatch = z.infer<typeof bookPatch>

/** What `GET /api/codebook?as=manifest` answers: the hash of each item's canonical JSON, by `kind:id`, in order. */
export const bookManifest = z.object({
  version: z.int(),
  hash: sha256Hex,
  publishedAt: z.string(),
  items: z.record(z.string(), sha256Hex),
  /** What was withdrawn from this version. */
  withdrawals: z.array(bookWithdrawal),
})
export type BookManifest = z.infer<typeof bookManifest>

/** What `GET /api/codebook?as=notices` answers: the newest version, and every withdrawal (R23). */
export const bookNotices = z.object({
  newest: z.nullable(z.int()),
  withdrawals: z.array(bookWithdrawal),
})
export type BookNotices = z.infer<typeof bookNotices>

/** The name of an item within a book: words share ids across kinds. */
export const itemKey = ({ kind, id }: { kind: string; id: string }): string => `${kind}:${id}`
