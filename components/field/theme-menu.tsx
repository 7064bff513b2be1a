'use client'

import { Moon, Sun, SunDim, SunMoon } from 'lucide-react'
import { type ReactNode, useEffect, useMemo, useState, useSyncExternalStore } from 'react'
import { usePorts } from '@/components/store/store-provider'
import { useJobs } from '@/components/store/use-rows'
import { Choice } from '@/components/ui/choice'
import type { Place } from '@/lib/model/place'
import {
  applyTheme,
  chooseTheme,
  keepNights,
  type ThemeChoice,
  themeAt,
  themeChoice,
} from './theme'

/** How often the sun is asked again. */
const LOOK_AGAIN_MS = 60_000
const CHANGED = 'farbench:theme'

function subscribe(listener: () => void): () => void {
  window.addEventListener(CHANGED, listener)
  return () => window.removeEventListener(CHANGED, listener)
}
const serverChoice = (): ThemeChoice => 'auto'

/** Keeps the document in the theme that was chosen, by the sun at the last known place when on auto. */
export function useThemeByTheSun(): void {
  const { clock } = usePorts()
  const place = useLastPlace()
  useEffect(() => {
    const look = () => {
      if (place !== null) {
        keepNights(place, clock.now())
      }
      applyTheme(themeAt(themeChoice(), clock.now()))
    }
    look()
    const timer = setInterval(look, LOOK_AGAIN_MS)
    window.addEventListener(CHANGED, look)
    return () => {
      clearInterval(timer)
      window.removeEventListener(CHANGED, look)
    }
  }, [clock, place])
}

/** The place of the newest job that has one. */
function useLastPlace(): Place | null {
  const jobs = useJobs()
  return useMemo(() => jobs?.find((job) => job.place !== null)?.place ?? null, [jobs])
}

const ICONS: Record<ThemeChoice, ReactNode> = {
  auto: <SunMoon aria-hidden="true" strokeWidth={2.5} />,
  day: <Sun aria-hidden="true" strokeWidth={2.5} />,
  shade: <SunDim aria-hidden="true" strokeWidth={2.5} />,
  night: <Moon aria-hidden="true" strokeWidth={2.5} />,
}
const WORDS: Record<ThemeChoice, string> = {
  auto: 'By the sun',
  day: 'Day, in sun',
  shade: 'Shade',
  night: 'Night',
}
const CHOICES: readonly ThemeChoice[] = ['auto', 'day', 'shade', 'night']

/** The choice of light, kept per phone; one tap each. */
export function ThemeMenu() {
  const choice = useSyncExternalStore(subscribe, themeChoice, serverChoice)
  const place = useLastPlace()
  const pick = (next: ThemeChoice) => {
    chooseTheme(next)
    window.dispatchEvent(new Event(CHANGED))
  }
  return (
    <Choice
      legend="Light"
      legendHidden
      columns={2}
      value={choice}
      onChange={pick}
      options={CHOICES.map((value) => ({ value, label: WORDS[value] }))}
      hint={
        place === null
          ? 'By the sun needs a place: take one with a job. Until then it stays day.'
          : 'By the sun: night from civil dusk to civil dawn at the last job’s place.'
      }
    />
  )
}

/** The key in the header that opens the choice. */
export function ThemeKey() {
  const choice = useSyncExternalStore(subscribe, themeChoice, serverChoice)
  const [open, setOpen] = useState(false)
  return (
    <>
      <button
        type="button"
        aria-expanded={open}
        onClick={() => setOpen(!open)}
        className="flex min-h-target min-w-target shrink-0 flex-col items-center justify-center gap-0.5 px-1 text-second font-bold"
      >
        {ICONS[choice]}
        Light
      </button>
      {open ? (
        <div className="order-last w-full border-b-2 border-ink pb-3">
          <ThemeMenu />
        </div>
      ) : null}
    </>
  )
}
