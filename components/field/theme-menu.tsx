'use client'

import { Choice } from '@/components/ui/choice'
import { THEME_OPTIONS, useThemeChoice } from './theme-choice'
import { useLastPlace } from './use-theme'

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
      options={THEME_OPTIONS}
      hint={
        place === null
          ? 'By the sun needs a place: take one with a job. Until then it stays day.'
          : 'By the sun: night from civil dusk to civil dawn at the last job’s place.'
      }
    />
  )
}
