'use client'

import { useEffect, useState } from 'react'
import { onAnnounce } from './announce'

/** What was said, and how often anything was: the same sentence twice is two messages (WCAG 4.1.3). */
type Said = { text: string; turn: number }
const NOTHING: Said = { text: '', turn: 0 }

/** The next message after `before`. */
export const saidNext = (before: Said, text: string): Said => ({ text, turn: before.turn + 1 })

/** At most one polite message in this time, in milliseconds. */
const POLITE_MS = 5000

/** The polite and the assertive live region; one of it per document. */
export function LiveRegion() {
  const [polite, setPolite] = useState(NOTHING)
  const [assertive, setAssertive] = useState(NOTHING)
  useEffect(() => {
    let waiting: string[] = []
    let timer: ReturnType<typeof setTimeout> | null = null
    const flush = () => {
      timer = null
      if (waiting.length > 0) {
        const text = waiting.join(' ')
        waiting = []
        setPolite((before) => saidNext(before, text))
        timer = setTimeout(flush, POLITE_MS)
      }
    }
    const off = onAnnounce((text, voice) => {
      if (voice === 'assertive') {
        setAssertive((before) => saidNext(before, text))
        return
      }
      waiting = [...waiting.filter((t) => t !== text), text]
      timer ??= setTimeout(flush, 0)
    })
    return () => {
      off()
      if (timer !== null) {
        clearTimeout(timer)
      }
    }
  }, [])
  // A new node for each turn: a region speaks what is put into it, not what stays the same.
  return (
    <div className="visually-hidden">
      <p role="status" aria-live="polite">
        <span key={polite.turn}>{polite.text}</span>
      </p>
      <p role="alert" aria-live="assertive">
        <span key={assertive.turn}>{assertive.text}</span>
      </p>
    </div>
  )
}
