'use client'

import { Play, Square } from 'lucide-react'
import { useEffect, useRef, useState } from 'react'
import { Key } from './key'

type Props = {
  url: string
  /** How long it is, as recorded: the file of a live recorder does not say. */
  seconds: number
  small?: boolean
}

/** "0:07". */
export const minutes = (seconds: number): string =>
  `${Math.floor(seconds / 60)}:${String(Math.floor(seconds % 60)).padStart(2, '0')}`

/** Plays a voice note: one key, and how far it has come. */
export function VoicePlayer({ url, seconds, small = false }: Props) {
  const audio = useRef<HTMLAudioElement>(null)
  const [playing, setPlaying] = useState<boolean>(false)
  const [at, setAt] = useState<number>(0)
  const [failed, setFailed] = useState<boolean>(false)
  useEffect(() => {
    const player = audio.current
    return () => player?.pause()
  }, [])
  const press = () => {
    const player = audio.current
    if (player === null) return
    if (playing) {
      player.pause()
      player.currentTime = 0
      return
    }
    setFailed(false)
    player.play().catch(() => setFailed(true))
  }
  return (
    <div className="flex flex-wrap items-center gap-4">
      {/* biome-ignore lint/a11y/useMediaCaption: a voice note is never transcribed by guess */}
      <audio
        ref={audio}
        src={url}
        preload="none"
        onPlay={() => setPlaying(true)}
        onPause={() => setPlaying(false)}
        onEnded={() => setPlaying(false)}
        onTimeUpdate={(event) => setAt(event.currentTarget.currentTime)}
      />
      <Key small={small} kind="plate" onClick={press}>
        {playing ? (
          <Square aria-hidden="true" strokeWidth={2.5} />
        ) : (
          <Play aria-hidden="true" strokeWidth={2.5} />
        )}
        {playing ? 'Stop' : 'Listen'}
      </Key>
      <p className="figures text-row">
        {minutes(Math.min(at, seconds))} <span className="visually-hidden">of</span>
        <span aria-hidden="true">/</span> {minutes(seconds)}
      </p>
      <p role="status" className="w-full font-bold text-nogo empty:hidden">
        {failed ? 'It cannot be played now. Try again with signal.' : null}
      </p>
    </div>
  )
}
