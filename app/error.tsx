'use client'

import { Key, KeyLink } from '@/components/ui/key'

/** A page that broke: what is safe, and what to press. */
export default function PageError({
  error,
  reset,
}: {
  error: Error & { digest?: string }
  reset: () => void
}) {
  // A part of the app that was wanted before this phone had fetched it.
  const isMissing = error.name === 'ChunkLoadError'
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-column content-start gap-6 py-6">
      <h1 className="caps text-plate">{isMissing ? 'Not on this phone yet' : 'This page broke'}</h1>
      {isMissing ? (
        <p>This screen comes with the next signal. Stay where there is some, then try again.</p>
      ) : null}
      <p>What was recorded on this device is kept. Nothing unsent is lost by this.</p>
      <div className="grid gap-3">
        {/* A part that failed to come is kept as failed until the page is loaded anew. */}
        <Key kind="main" onClick={isMissing ? () => window.location.reload() : reset}>
          Try again
        </Key>
        <KeyLink href="/field">Open the field</KeyLink>
      </div>
      <p className="text-second text-ink2">
        For the shop: {error.digest ?? error.name}
        {error.message ? `, ${error.message}` : ''}
      </p>
    </main>
  )
}
