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
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-column content-start gap-6 py-6">
      <h1 className="caps text-plate">This page broke</h1>
      <p>What was recorded on this device is kept. Nothing unsent is lost by this.</p>
      <div className="grid gap-3">
        <Key kind="main" onClick={reset}>
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
