import type { Night } from './nights'

/**
 * Which of the three themes is on. The choice and the next nights are kept beside each other in local
 * storage, because public/theme.js must know both before the first paint and before the store is open.
 */
const THEMES = ['day', 'shade', 'night'] as const
export type Theme = (typeof THEMES)[number]
export type ThemeChoice = Theme | 'auto'

type Kept = { choice: ThemeChoice | null; nights: Night[] }

const KEY = 'farbench-theme'
const GROUND: Record<Theme, string> = { day: '#fcfcf6', shade: '#ebdcb9', night: '#0b0806' }

/** What this phone keeps; nothing kept or nothing readable answers no choice and no nights. */
function readKept(): Kept {
  try {
    const kept = JSON.parse(localStorage.getItem(KEY) ?? '{}') as Partial<Kept>
    const choice = kept.choice ?? null
    return { choice, nights: Array.isArray(kept.nights) ? kept.nights : [] }
  } catch {
    return { choice: null, nights: [] }
  }
}

function keep(kept: Kept): void {
  try {
    localStorage.setItem(KEY, JSON.stringify(kept))
  } catch {
    // A full or forbidden local storage costs only the memory of the choice.
    return
  }
}

/** The person's choice; at first start what the phone asks for. */
export function themeChoice(): ThemeChoice {
  const { choice } = readKept()
  if (choice !== null) {
    return choice
  }
  const asks = (query: string) => window.matchMedia(query).matches
  return asks('(prefers-color-scheme: dark)') && !asks('(prefers-contrast: more)')
    ? 'night'
    : 'auto'
}

/** Keeps the choice on this phone. */
export const chooseTheme = (choice: ThemeChoice): void => keep({ ...readKept(), choice })

/** Keeps the nights around `nowMs` at a place: yesterday's, today's and tomorrow's. */
export async function keepNights(
  at: { latitude: number; longitude: number },
  nowMs: number,
): Promise<void> {
  const { nightsAt } = await import('./nights')
  keep({ choice: readKept().choice, nights: nightsAt(at.latitude, at.longitude, nowMs) })
}

/** The theme a choice means at an instant: auto is night between civil dusk and civil dawn. */
export function themeAt(choice: ThemeChoice, nowMs: number): Theme {
  if (choice !== 'auto') {
    return choice
  }
  return readKept().nights.some(([from, to]) => nowMs >= from && nowMs < to) ? 'night' : 'day'
}

/** Puts the theme on the document. */
export function applyTheme(theme: Theme): void {
  document.documentElement.dataset.theme = theme
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', GROUND[theme])
}
