import type { CheckItem } from '@/lib/model/code-book'

/** `4 min`; halves are kept, anything under a minute is `under 1 min`. */
export function minutesWords(minutes: number): string {
  if (minutes < 0.75) return 'under 1 min'
  if (minutes < 90) return `${Math.round(minutes)} min`
  const hours = Math.floor(minutes / 60)
  return `${hours} h ${String(Math.round(minutes - hours * 60)).padStart(2, '0')}`
}

export const MACHINE_STATE_WORDS: Record<CheckItem['machineState'], string> = {
  off: 'off, key out',
  keyOn: 'key on, engine off',
  cranking: 'cranking',
  runningNeutral: 'running in neutral',
  guardedStand: 'raised on a guarded stand',
}

export const LIGHT_WORDS: Record<CheckItem['light'], string> = {
  any: 'any light',
  lampEnough: 'a lamp is enough',
  daylight: 'daylight only',
}

/** The engine writes plain ASCII; the screen shows the signs. */
export const onScreen = (words: string): string =>
  words
    .replaceAll('+-', '±')
    .replace(/(\d) C\b/g, '$1 °C')
    .replace(/(^|[\s(])-(?=\d)/g, '$1−')
