'use client'
import type { ReactNode } from 'react'
import { useBook } from '../store/use-book'
import { Screen } from '../ui/screen'

/** Shows its children when the code book is on the phone; else says plainly what is missing. */
export function BookGate({ children }: { children: ReactNode }) {
  const { status } = useBook()
  if (status === 'opening')
    return (
      <Screen title="Checks">
        <p role="status">Opening the code book.</p>
      </Screen>
    )
  if (status === 'missing')
    return (
      <Screen title="No code book on this phone">
        <p>
          Checks and suspects come from the shop&apos;s code book, and this phone has not fetched
          one yet. Open this once with signal. Notes, photos, codes and the way out work without it.
        </p>
      </Screen>
    )
  return children
}
