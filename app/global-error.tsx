'use client'

import { useLayoutEffect } from 'react'
import { keepTheme } from '@/components/field/theme-choice'
import { systemClock } from '@/lib/ports/clock'
import './globals.css'

/** The last page: shown when even the frame of the pages fails. Work on the phone is untouched by it. */
export default function GlobalError({ reset }: { reset: () => void }) {
  // This page has a document of its own, which theme.js did not see: without this it is white at night.
  useLayoutEffect(() => keepTheme(null, () => systemClock.now()), [])
  return (
    <html lang="en-GB" data-theme="day" suppressHydrationWarning={true}>
      <body>
        <main className="grid gap-4 p-4">
          <h1 className="caps text-title">Something broke here</h1>
          <p>Nothing saved on this phone is lost. Try again; if it stays, tell the shop.</p>
          <button type="button" className="key key-main" onClick={reset}>
            Try again
          </button>
        </main>
      </body>
    </html>
  )
}
