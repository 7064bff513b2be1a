'use client'

import { useEffect, useRef } from 'react'
import { announce } from '@/components/ui/announce'
import { whenWords } from '../field/when-words'
import { useDesk } from './desk-context'
import { useNow } from './use-now'

/**
 * How the line to the shop is: live only while the server was heard within the last minute; else when it
 * was last heard, because what is on the screen is no newer than that.
 */
export function LineState() {
  const { lineState, shop } = useDesk()
  const before = useRef(lineState.kind)
  useEffect(() => {
    if (before.current === 'live' && lineState.kind === 'lost')
      announce('The line to the shop is lost.')
    if (before.current === 'lost' && lineState.kind === 'live')
      announce('The line to the shop is back.')
    before.current = lineState.kind
  }, [lineState.kind])
  const now = useNow()
  const time = (ms: number) => whenWords(new Date(ms).toISOString(), shop.zone, now)
  switch (lineState.kind) {
    case 'opening':
      return <p className="desk-line">Opening the line</p>
    case 'live':
      return (
        <p className="desk-line" data-line="live">
          <Lamp whole={true} />
          <strong className="caps text-section">Live</strong>
          <span className="text-second text-ink2">heard {time(lineState.heardAt)}</span>
        </p>
      )
    case 'lost':
      return (
        <p className="desk-line" data-line="lost">
          <Lamp whole={false} />
          <strong className="caps text-section">Not live</strong>
          <span className="text-second">
            {lineState.heardAt === null ? 'not heard yet' : `last heard ${time(lineState.heardAt)}`}
          </span>
        </p>
      )
    case 'signedOut':
      return (
        <p className="desk-line" data-line="signedOut">
          <strong className="caps text-section">Signed out</strong>
          <a href="/login">Sign in again</a>
        </p>
      )
  }
}

/** A wire: whole, or cut with its ends apart. */
function Lamp({ whole }: { whole: boolean }) {
  return (
    <svg viewBox="0 0 40 16" width="40" height="16" aria-hidden="true" fill="none">
      {whole ? (
        <path d="M1 8H39" className="stroke-ink" strokeWidth="5" />
      ) : (
        <path d="M1 4H15M25 12H39" className="stroke-nogo" strokeWidth="5" />
      )}
    </svg>
  )
}
