'use client'

import { useEffect, useMemo, useSyncExternalStore } from 'react'
import { usePorts } from '@/components/store/store-provider'
import { useJobs } from '@/components/store/use-rows'
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

/** The choice of light on this phone, and the way to make another. */
export function useThemeChoice(): [ThemeChoice, (next: ThemeChoice) => void] {
  return [useSyncExternalStore(subscribe, themeChoice, serverChoice), pick]
}
function pick(next: ThemeChoice): void {
  chooseTheme(next)
  window.dispatchEvent(new Event(CHANGED))
}

/** Keeps the document in the theme that was chosen, by the sun at the last known place when on auto. */
export function useThemeByTheSun(): void {
  const { clock } = usePorts()
  const place = useLastPlace()
  useEffect(() => {
    const apply = () => applyTheme(themeAt(themeChoice(), clock.now()))
    const look = () => {
      apply()
      if (place !== null) keepNights(place, clock.now()).then(apply, () => undefined)
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
export function useLastPlace(): Place | null {
  const jobs = useJobs()
  return useMemo(() => jobs?.find((job) => job.place !== null)?.place ?? null, [jobs])
}
