'use client'

import { useEffect, useRef, useState } from 'react'
import { usePhone, usePorts } from '@/components/store/store-provider'
import type { Id } from '@/lib/model/id'
import type { MicrophoneProblem, TakenVoice, VoiceTake } from '@/lib/ports/voice'
import { heldVoices } from './taken-held'

/** Where a voice note stands: nothing yet, the microphone asked for, recording, or taken. */
export type VoiceState =
  | { kind: 'idle' | 'asking' }
  | { kind: 'recording'; sinceMs: number }
  | { kind: 'taken'; voice: TakenVoice; url: string }

/** Why there is none, in one sentence. */
export const MICROPHONE_WORDS: Record<MicrophoneProblem['kind'], string> = {
  refused:
    'The microphone is not allowed for this app: allow it in the phone’s settings for this page, or write a note.',
  noMicrophone: 'No microphone can be used now: another app may hold it. Write a note instead.',
  notSupported: 'This browser cannot record. Write a note instead.',
  nothingHeard: 'Nothing was recorded. Try again.',
  ranOn:
    'The recording ran on past 60 s while the phone slept and cannot be kept. Record it again.',
}

const IDLE: VoiceState = { kind: 'idle' }
const TICK_MS = 200

/** Records one voice note of a job; what is recorded is held until it is saved or thrown away. */
export function useVoice(jobId: Id) {
  const { microphone, clock } = usePorts()
  const key = `${usePhone()?.actor.personId} ${jobId}`
  const [state, setState] = useState<VoiceState>(() => takenState(heldVoices.get(key)))
  const [problem, setProblem] = useState<string | null>(null)
  const take = useRef<VoiceTake | null>(null)
  const url = state.kind === 'taken' ? state.url : null
  useEffect(() => () => (url === null ? undefined : URL.revokeObjectURL(url)), [url])
  const here = useRef<boolean>(false)
  useEffect(() => {
    here.current = true
    return () => {
      here.current = false
      take.current?.drop()
    }
  }, [])
  const fail = (kind: MicrophoneProblem['kind']) => {
    setProblem(MICROPHONE_WORDS[kind])
    setState(IDLE)
  }
  const run = async () => {
    setProblem(null)
    setState({ kind: 'asking' })
    const begun = await microphone.record()
    if (!begun.ok) return fail(begun.problem.kind)
    // The person left while the browser was asking.
    if (!here.current) return begun.value.drop()
    take.current = begun.value
    setState({ kind: 'recording', sinceMs: clock.now() })
    const ended = await begun.value.ended
    take.current = null
    if (!ended.ok) return fail(ended.problem.kind)
    heldVoices.set(key, ended.value)
    setState(takenState(ended.value))
  }
  return {
    state,
    problem,
    start: () => {
      run().catch(() => fail('noMicrophone'))
    },
    stop: () => take.current?.stop(),
    throwAway: () => {
      heldVoices.set(key, null)
      setState(IDLE)
    },
  }
}

function takenState(voice: TakenVoice | null): VoiceState {
  if (voice === null) return IDLE
  const url = URL.createObjectURL(new Blob([voice.bytes], { type: voice.mime }))
  return { kind: 'taken', voice, url }
}

/** Seconds since the recording began, as they pass. */
export function useElapsed(sinceMs: number): number {
  const { clock, timer } = usePorts()
  const [nowMs, setNowMs] = useState<number>(sinceMs)
  useEffect(() => {
    let callOff: () => void = () => undefined
    const tick = () => {
      setNowMs(clock.now())
      callOff = timer.after(TICK_MS, tick)
    }
    tick()
    return () => callOff()
  }, [clock, timer])
  return Math.max(0, (nowMs - sinceMs) / 1000)
}
