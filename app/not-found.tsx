import type { Metadata } from 'next'
import { KeyLink } from '@/components/ui/key'

export const metadata: Metadata = { title: 'Nothing here' }

export default function NotFound() {
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-column content-start gap-6 py-6">
      <h1 className="caps text-plate">Nothing here</h1>
      <p>There is no page at this address. Check it, or start again from one of these.</p>
      <nav aria-label="Ways on" className="grid gap-3">
        <KeyLink kind="main" href="/field">
          The field
        </KeyLink>
        <KeyLink href="/desk">The desk</KeyLink>
        <KeyLink href="/">Front page</KeyLink>
      </nav>
    </main>
  )
}
