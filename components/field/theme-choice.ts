'use client'

import { useEffect, useSyncExternalStore } from 'react'
import {
  applyTheme,
  chooseTheme,
  keepNights,
  type ThemeChoice,
  themeAt,
  themeChoice,
} from './theme'

/** The choice of light as field and desk offer it, and the light itself once it is chosen. */
export const THEME_OPTIONS: readonly { value: ThemeChoice; label: string }[] = [
  { value: 'auto', label: 'By the sun' },
  { value: 'day', label: 'Day, in sun' },
  { value: 'shade', label: 'Shade' },
  { value: 'night', label: 'Night' },
]

/** How often the sun is asked again. */
const LOOK_AGAIN_MS = 60_000
const CHANGED = 'farbench:theme'

function subscribe(listener: () => void): () => void {
  window.addEventListener(CHANGED, listener)
  return () => window.removeEventListener(CHANGED, listener)
}
const serverChoice = (): ThemeChoice => 'auto'

/** The choice of light on this browser, and the way to make another. */
export function useThemeChoice(): [ThemeChoice, (next: ThemeChoice) => void] {
  return [useSyncExternalStore(subscribe, themeChoice, serverChoice), pickTheme]
}

/** Keeps the choice and puts it on wherever `keepTheme` runs. */
export function pickTheme(next: ThemeChoice): void {
  chooseTheme(next)
  window.dispatchEvent(new Event(CHANGED))
}

type At = { latitude: number; longitude: number }

/**
 * Keeps the document in the theme that was chosen until the answer is called. On auto by the sun at `place`;
 * without one by the nights that were kept for the last place.
 */
export function keepTheme(place: At | null, now: () => number): () => void {
  const apply = () => applyTheme(themeAt(themeChoice(), now()))
  const look = () => {
    apply()
    if (place !== null) keepNights(place, now()).then(apply, () => undefined)
  }
  look()
  const timer = setInterval(look, LOOK_AGAIN_MS)
  const stop = subscribe(look)
  return () => {
    clearInterval(timer)
    stop()
  }
}

/** `keepTheme` for as long as the screen is open. */
export function useThemeAt(place: At | null, now: () => number): void {
  useEffect(() => keepTheme(place, now), [place, now])
}
