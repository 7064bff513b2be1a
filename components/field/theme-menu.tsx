'use client'

import { Choice } from '@/components/ui/choice'
import type { ThemeChoice } from './theme'
import { useLastPlace, useThemeChoice } from './use-theme'

const WORDS: Record<ThemeChoice, string> = {
  auto: 'By the sun',
  day: 'Day, in sun',
  shade: 'Shade',
  night: 'Night',
}
const CHOICES: readonly ThemeChoice[] = ['auto', 'day', 'shade', 'night']

/** The choice of light, kept per phone; one tap each. */
export function ThemeMenu() {
  const [choice, pick] = useThemeChoice()
  const place = useLastPlace()
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
