'use client'

import { useEffect, useState } from 'react'
import { onAnnounce } from './announce'

/** At most one polite message in this time, in milliseconds. */
const POLITE_MS = 5000

/** The polite and the assertive live region; one of it per document. */
export function LiveRegion() {
  const [polite, setPolite] = useState('')
  const [assertive, setAssertive] = useState('')
  useEffect(() => {
    let waiting: string[] = []
    let timer: ReturnType<typeof setTimeout> | null = null
    const flush = () => {
      timer = null
      if (waiting.length > 0) {
        setPolite(waiting.join(' '))
        waiting = []
        timer = setTimeout(flush, POLITE_MS)
      }
    }
    const off = onAnnounce((text, voice) => {
      if (voice === 'assertive') {
        setAssertive(text)
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
  return (
    <div className="visually-hidden">
      <p role="status" aria-live="polite">
        {polite}
      </p>
      <p role="alert" aria-live="assertive">
        {assertive}
      </p>
    </div>
  )
}
