import type { VoiceRef } from '@/lib/model/photo'
import type { Result } from '@/lib/model/result'

/** A voice note ready to keep: as the recorder wrote it, known by the SHA-256 of its bytes. */
export type TakenVoice = Pick<VoiceRef, 'hash' | 'mime' | 'seconds'> & { bytes: ArrayBuffer }

/**
 * Why there is no voice note: the person or the phone refused the microphone, there is none or another app
 * holds it, this browser cannot record, nothing was recorded, or it ran on while the phone slept.
 */
export type MicrophoneProblem = {
  kind: 'refused' | 'noMicrophone' | 'notSupported' | 'nothingHeard' | 'ranOn'
}

/** A recording that runs. It ends by `stop`, after 60 s, or when the phone takes the microphone away. */
export type VoiceTake = {
  stop(): void
  /** Ends it and lets go of everything. */
  drop(): void
  ended: Promise<Result<TakenVoice, MicrophoneProblem>>
}

export type Microphone = { record(): Promise<Result<VoiceTake, MicrophoneProblem>> }
