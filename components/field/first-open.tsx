'use client'

import { useBook } from '@/components/store/use-book'
import { useUnsent } from '@/components/store/use-unsent'
import { Key, KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { useWorkerReady } from './use-worker-ready'

/** What must be on the phone before it may be taken out of signal; each with whether it is there. */
export function useReadiness() {
  const book = useBook()
  const unsent = useUnsent()
  const worker = useWorkerReady()
  const parts = [
    { name: 'The app itself', there: worker },
    { name: 'The code book', there: book.status === 'ready' },
    { name: 'Jobs, fleet, spec sheets, your bag', there: unsent.fetchedAt !== null },
  ]
  return { parts, ready: parts.every((part) => part.there) }
}

/** Shown until the phone holds all it needs: what is there and what is still being fetched. */
export function FirstOpen() {
  const { parts, ready } = useReadiness()
  const unsent = useUnsent()
  if (ready) {
    return null
  }
  return (
    <section className="grid gap-3" aria-live="polite">
      <RuleEdge>Not ready for no signal</RuleEdge>
      <p>
        {unsent.needs === 'signIn'
          ? 'The shop asks you to sign in again before it hands out the rest.'
          : 'Stay where there is signal until all three are on this phone.'}
      </p>
      <ul className="grid gap-1">
        {parts.map((part) => (
          <li key={part.name} className="flex flex-wrap items-center gap-x-3">
            <Ticked on={part.there} />
            <span className="min-w-40 flex-1">{part.name}</span>
            <span className="caps text-section">{part.there ? 'here' : 'missing'}</span>
          </li>
        ))}
      </ul>
      {unsent.needs === 'signIn' ? (
        <KeyLink href="/login">Sign in</KeyLink>
      ) : (
        <Key
          small
          onClick={() => {
            unsent.trySending().catch(() => undefined)
          }}
        >
          Fetch now
        </Key>
      )}
    </section>
  )
}

/** A ticked or empty box. */
export function Ticked({ on }: { on: boolean }) {
  return (
    <svg viewBox="0 0 28 28" className="size-7 shrink-0" fill="none" aria-hidden="true">
      <rect x="3" y="3" width="22" height="22" stroke="currentColor" strokeWidth="2.6" />
      {on ? <path d="M8 14.5 12.5 19 20.5 9" stroke="currentColor" strokeWidth="3.4" /> : null}
    </svg>
  )
}
