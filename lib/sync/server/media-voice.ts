import { createHash } from 'node:crypto'
import { VOICE_SECONDS, type VoiceRef } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import type { Heard } from './media-heard'
import { readMp4 } from './media-mp4'
import { readOgg } from './media-ogg'
import { readWebm } from './media-webm'
import type { HttpProblem } from './problems'

type VoiceMime = VoiceRef['mime']

/** A recorder stops a little after it is told to; what ran longer is no voice note of ours (a choice). */
const LATE_SECONDS = 2

const READERS: Record<VoiceMime, (file: Buffer) => Heard | null> = {
  'audio/webm': readWebm,
  'audio/ogg': readOgg,
  'audio/mp4': readMp4,
}

/** The container by its first bytes, or null. */
export function voiceMime(file: Buffer): VoiceMime | null {
  if (file.length > 4 && file.readUInt32BE(0) === 0x1a45dfa3) return 'audio/webm'
  if (file.toString('latin1', 0, 4) === 'OggS') return 'audio/ogg'
  return file.toString('latin1', 4, 8) === 'ftyp' ? 'audio/mp4' : null
}

/**
 * Answers the container of a voice note when its bytes match `hash` (lower-case hex), hold one track of
 * sound no longer than 60 s and no position; else `wrongHash`, `wrongVoice` or `hasPosition`. It is kept
 * as recorded and never decoded.
 */
export function checkVoice(file: Buffer, hash: string): Result<VoiceMime, HttpProblem> {
  if (createHash('sha256').update(file).digest('hex') !== hash) return fail({ kind: 'wrongHash' })
  const mime = voiceMime(file)
  const heard = mime && READERS[mime](file)
  if (!heard || heard.seconds > VOICE_SECONDS + LATE_SECONDS) return fail({ kind: 'wrongVoice' })
  return heard.hasPosition ? fail({ kind: 'hasPosition' }) : ok(mime)
}
