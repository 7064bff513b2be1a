'use client'

import { Mic, Square } from 'lucide-react'
import { NotSaved, useSave } from '@/components/checks/use-save'
import { useDraft } from '@/components/store/use-draft'
import { useStamp } from '@/components/store/use-stamp'
import { announce } from '@/components/ui/announce'
import { DraftSign } from '@/components/ui/draft-sign'
import { Field } from '@/components/ui/field'
import { Hold } from '@/components/ui/hold'
import { Key } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'
import { minutes, VoicePlayer } from '@/components/ui/voice-player'
import { VOICE_SECONDS } from '@/lib/model/photo'
import type { TakenVoice } from '@/lib/ports/voice'
import { OfJob } from '../of-job'
import { jobHref } from '../route'
import { useRoute } from '../router'
import { size } from '../times'
import { useElapsed, useVoice, type VoiceState } from './use-voice'

/** A voice note of at most 60 s (R8): record, listen, save or throw away. Works without signal. */
export function VoiceScreen({ jobId }: { jobId: string }) {
  return <OfJob jobId={jobId}>{({ job }) => <TakeVoice jobId={job.id} />}</OfJob>
}

function TakeVoice({ jobId }: { jobId: string }) {
  const key = `job.${jobId}.voice`
  const { value: caption, set, kept: draftKept } = useDraft<string>(key, '')
  const { state, problem, start, stop, throwAway } = useVoice(jobId)
  const { save, saving, problem: notSaved } = useSave()
  const stamp = useStamp()
  const { go, here } = useRoute()
  const keep = async ({ bytes, ...about }: TakenVoice) => {
    const words = caption.trim()
    const voice = { ...about, bytes: bytes.byteLength }
    const body = { kind: 'voice', voice, caption: words === '' ? null : words } as const
    const kept = await save([stamp.entry(jobId, body)], {
      photos: [{ hash: about.hash, jobId, bytes, mime: about.mime }],
      clearDrafts: [key],
      wordsAlone: words === '' ? [] : [stamp.entry(jobId, { kind: 'note', words })],
    })
    if (!kept) return
    throwAway()
    announce('Voice note saved on this phone.')
    go(jobHref(jobId, 'log'), { replace: true, from: here })
  }
  return (
    <Screen
      title="Voice note"
      second={`Up to ${VOICE_SECONDS} s. Kept as you say it, never turned into text.`}
      foot={<Foot state={state} saving={saving} start={start} stop={stop} save={keep} />}
    >
      {state.kind === 'recording' ? <Running sinceMs={state.sinceMs} /> : null}
      {state.kind === 'taken' ? (
        <section className="grid gap-3">
          <p>
            Recorded: <b className="figures">{minutes(state.voice.seconds)}</b>,{' '}
            {size(state.voice.bytes.byteLength)}. Not saved yet: it is held while the app stays
            open.
          </p>
          <VoicePlayer url={state.url} seconds={state.voice.seconds} />
          <Hold
            label="Throw away"
            question="Throw this voice note away for good?"
            confirmLabel="Yes, throw away"
            disabled={saving}
            onConfirm={throwAway}
          />
        </section>
      ) : null}
      <p role="status" className="font-bold text-nogo empty:hidden">
        {problem}
      </p>
      <NotSaved problem={notSaved} />
      <Field
        label="Caption"
        value={caption}
        onChange={set}
        maxLength={300}
        autoCapitalize="sentences"
      />
      <DraftSign kept={draftKept} />
    </Screen>
  )
}

type FootProps = {
  state: VoiceState
  saving: boolean
  start: () => void
  stop: () => void
  save: (voice: TakenVoice) => void
}

/** The one thing to do next. */
function Foot({ state, saving, start, stop, save }: FootProps) {
  switch (state.kind) {
    case 'recording':
      return (
        <Key kind="main" onClick={stop}>
          <Square aria-hidden="true" strokeWidth={2.5} />
          Stop
        </Key>
      )
    case 'taken':
      return (
        <Key kind="main" disabled={saving} onClick={() => save(state.voice)}>
          Save voice note
        </Key>
      )
    default:
      return (
        <Key kind="main" disabled={state.kind === 'asking'} onClick={start}>
          <Mic aria-hidden="true" strokeWidth={2.5} />
          {state.kind === 'asking' ? 'Asking for the microphone' : 'Record'}
        </Key>
      )
  }
}

/** How long it runs, in figures that can be read from the seat. */
function Running({ sinceMs }: { sinceMs: number }) {
  const elapsed = Math.min(VOICE_SECONDS, useElapsed(sinceMs))
  return (
    <section className="grid gap-2" aria-label="Recording">
      <p className="caps text-section">Recording</p>
      <p className="figures text-hero" role="timer">
        {minutes(elapsed)} <span className="text-row">of {minutes(VOICE_SECONDS)}</span>
      </p>
      <progress className="voice-bar w-full" max={VOICE_SECONDS} value={elapsed}>
        {Math.floor(elapsed)} s
      </progress>
    </section>
  )
}
