'use client'

import { Choice } from '@/components/ui/choice'
import { THEME_OPTIONS, useThemeChoice } from '../field/theme-choice'

/** The choice of light, kept on this browser; by the sun means at the last job's place. */
export function ThemePick() {
  const [choice, pick] = useThemeChoice()
  return (
    <Choice legend="Light" columns={2} options={THEME_OPTIONS} value={choice} onChange={pick} />
  )
}
