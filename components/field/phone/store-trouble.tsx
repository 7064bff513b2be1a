'use client'

import { useStoreTrouble } from '@/components/store/use-unsent'
import { Key } from '@/components/ui/key'

const WORDS = {
  blocked:
    'Another window of this app keeps the store from opening. Close it; everything recorded is kept.',
  lost: 'The browser has let go of the store. Everything recorded is kept. Load the app again to go on.',
} as const

/** Says when the store cannot be opened or was lost under the page, and the way out of it (P25). */
export function StoreTrouble() {
  const trouble = useStoreTrouble()
  if (trouble === 'none') {
    return null
  }
  return (
    <div
      role="alert"
      className="safe-sides flex flex-wrap items-center gap-3 border-y-2 border-ink py-2"
    >
      <p className="min-w-40 flex-1 font-bold">{WORDS[trouble]}</p>
      <Key small onClick={() => window.location.reload()}>
        Load again
      </Key>
    </div>
  )
}
