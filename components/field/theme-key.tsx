'use client'

import { Moon, Sun, SunDim, SunMoon } from 'lucide-react'
import { lazy, type ReactNode, Suspense, useState } from 'react'
import type { ThemeChoice } from './theme'
import { useThemeChoice } from './theme-choice'

const ThemeMenu = lazy(() => import('./theme-menu').then((file) => ({ default: file.ThemeMenu })))

const ICONS: Record<ThemeChoice, ReactNode> = {
  auto: <SunMoon aria-hidden="true" strokeWidth={2.5} />,
  day: <Sun aria-hidden="true" strokeWidth={2.5} />,
  shade: <SunDim aria-hidden="true" strokeWidth={2.5} />,
  night: <Moon aria-hidden="true" strokeWidth={2.5} />,
}
/** The key in the header that opens the choice. */
export function ThemeKey() {
  const [choice] = useThemeChoice()
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
          <Suspense fallback={null}>
            <ThemeMenu />
          </Suspense>
        </div>
      ) : null}
    </>
  )
}
