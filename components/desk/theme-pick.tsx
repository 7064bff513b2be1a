'use client'

import { useSyncExternalStore } from 'react'
import { Choice } from '@/components/ui/choice'
import { applyTheme, chooseTheme, type ThemeChoice, themeAt, themeChoice } from '../field/theme'
import { useDesk } from './desk-context'

const CHANGED = 'farbench:theme'

function subscribe(changed: () => void): () => void {
  window.addEventListener(CHANGED, changed)
  return () => window.removeEventListener(CHANGED, changed)
}

const OPTIONS: { value: ThemeChoice; label: string }[] = [
  { value: 'auto', label: 'By the sun' },
  { value: 'day', label: 'Day' },
  { value: 'shade', label: 'Shade' },
  { value: 'night', label: 'Night' },
]

/** The choice of light, kept on this browser; by the sun means at the last job's place. */
export function ThemePick() {
  const { ports } = useDesk()
  const choice = useSyncExternalStore(subscribe, themeChoice, () => 'auto' as const)
  return (
    <Choice
      legend="Light"
      columns={2}
      options={OPTIONS}
      value={choice}
      onChange={(next) => {
        chooseTheme(next)
        applyTheme(themeAt(next, ports.now()))
        window.dispatchEvent(new Event(CHANGED))
      }}
    />
  )
}
