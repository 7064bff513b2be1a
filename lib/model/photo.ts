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

export const VOICE_MIMES = ['audio/webm', 'audio/ogg', 'audio/mp4'] as const
/** Longest voice note in seconds (R8), and what its file may weigh at most (a choice: 60 s at 260 kbit/s). */
export const VOICE_SECONDS = 60
export const VOICE_BYTES = 2_000_000

/** What an entry says about its voice note: kept as recorded, its bytes travel like those of a photo. */
export const voiceRef = z.strictObject({
  hash: sha256Hex,
  bytes: z.int().check(z.minimum(1), z.maximum(VOICE_BYTES)),
  mime: z.enum(VOICE_MIMES),
  seconds: z.number().check(z.minimum(0), z.maximum(VOICE_SECONDS)),
})
export type VoiceRef = z.infer<typeof voiceRef>

/** The server's word on a photo or a voice note: received and verified, or still on the phone (then there is no row). */
export const photoRow = z.object({
  hash: sha256Hex,
  jobId: id,
  bytes: z.int(),
  mime: z.string(),
  receivedAt: z.string(),
})
export type PhotoRow = z.infer<typeof photoRow>
