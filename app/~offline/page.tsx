import type { Metadata } from 'next'
import { KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'

export const metadata: Metadata = { title: 'No signal' }

/** Shown in place of a page that only the shop's server has, while it cannot be reached. */
export default function OfflinePage() {
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-column content-start gap-6 py-6">
      <RuleEdge>No signal</RuleEdge>
      <h1 className="caps text-plate">This page needs the shop</h1>
      <p>
        The shop’s server cannot be reached from here. The field works without it, with the jobs and
        the code book this phone holds.
      </p>
      <KeyLink kind="main" href="/field">
        Open the field
      </KeyLink>
      <p className="text-second text-ink2">With signal again, load this page once more.</p>
    </main>
  )
}
