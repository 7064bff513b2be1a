import { VOICE_BYTES, VOICE_MIMES, VOICE_SECONDS, type VoiceRef } from '@/lib/model/photo'
import { fail, ok, type Result } from '@/lib/model/result'
import { systemClock, systemTimer } from './clock'
import type { MicrophoneProblem, TakenVoice, VoiceTake } from './voice'

/** Speech is clear at this (a choice): a minute is 240 kB. */
const BITS_PER_SECOND = 32_000
/** A recorder that was told to stop at 60 s may write a little more. */
const LATE_MS = 1_500

/** The container this browser records, as its recorder wants it named, or null. */
function containerOf(): { asked: string; mime: VoiceRef['mime'] } | null {
  if (typeof MediaRecorder === 'undefined') return null
  const asked = ['audio/webm;codecs=opus', 'audio/ogg;codecs=opus', 'audio/mp4'].find((name) =>
    MediaRecorder.isTypeSupported(name),
  )
  const mime = VOICE_MIMES.find((name) => asked?.startsWith(name))
  return asked === undefined || mime === undefined ? null : { asked, mime }
}

/** Asks for the microphone and begins to record. */
export async function recordVoice(): Promise<Result<VoiceTake, MicrophoneProblem>> {
  const devices = globalThis.navigator?.mediaDevices as MediaDevices | undefined
  const container = containerOf()
  if (devices === undefined || container === null) return fail({ kind: 'notSupported' })
  let stream: MediaStream
  try {
    stream = await devices.getUserMedia({ audio: { channelCount: 1 } })
  } catch (cause) {
    const isRefused = cause instanceof DOMException && cause.name === 'NotAllowedError'
    return fail({ kind: isRefused ? 'refused' : 'noMicrophone' })
  }
  return ok(takeOf(stream, container))
}

function takeOf(
  stream: MediaStream,
  container: { asked: string; mime: VoiceRef['mime'] },
): VoiceTake {
  const recorder = new MediaRecorder(stream, {
    mimeType: container.asked,
    audioBitsPerSecond: BITS_PER_SECOND,
  })
  const parts: Blob[] = []
  const startMs = systemClock.now()
  const stop = () => {
    if (recorder.state !== 'inactive') recorder.stop()
  }
  const callOff = systemTimer.after(VOICE_SECONDS * 1000, stop)
  const ended = new Promise<Result<TakenVoice, MicrophoneProblem>>((resolve) => {
    recorder.addEventListener('dataavailable', (event) => parts.push(event.data))
    recorder.addEventListener('stop', () => {
      callOff()
      for (const track of stream.getTracks()) track.stop()
      const ms = systemClock.now() - startMs
      resolve(takenOf(new Blob(parts), { mime: container.mime, ms }))
    })
  })
  recorder.start()
  return {
    stop,
    drop() {
      parts.length = 0
      stop()
    },
    ended,
  }
}

async function takenOf(
  recorded: Blob,
  { mime, ms }: { mime: VoiceRef['mime']; ms: number },
): Promise<Result<TakenVoice, MicrophoneProblem>> {
  if (recorded.size === 0) return fail({ kind: 'nothingHeard' })
  if (ms > VOICE_SECONDS * 1000 + LATE_MS || recorded.size > VOICE_BYTES) {
    return fail({ kind: 'ranOn' })
  }
  const bytes = await recorded.arrayBuffer()
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes))
  const hash = Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
  const seconds = Math.min(VOICE_SECONDS, Math.round(ms / 100) / 10)
  return ok({ hash, mime, seconds, bytes })
}
