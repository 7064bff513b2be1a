import * as z from 'zod/mini'
import { id, sha256Hex } from './id'

/** What an entry says about its photo: the bytes travel apart and are known by their SHA-256. */
export const photoRef = z.strictObject({
  hash: sha256Hex,
  bytes: z.int().check(z.minimum(1), z.maximum(5_000_000)),
  mime: z.enum(['image/jpeg', 'image/webp', 'image/png']),
  width: z.int().check(z.minimum(1)),
  height: z.int().check(z.minimum(1)),
})
export type PhotoRef = z.infer<typeof photoRef>

/** The server's word on a photo: received and verified, or still on the phone (then there is no row). */
export const photoRow = z.object({
  hash: sha256Hex,
  jobId: id,
  bytes: z.int(),
  mime: z.string(),
  receivedAt: z.string(),
})
export type PhotoRow = z.infer<typeof photoRow>
