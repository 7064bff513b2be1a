import type { ReactNode } from 'react'
import { classes } from './class-names'

/** Signal words after ANSI Z535.6. */
export type SignalWord = 'DANGER' | 'WARNING' | 'CAUTION' | 'NOTICE'

type Props = { signal: SignalWord; children: ReactNode; onPlate?: boolean; className?: string }

/** A caution with its signal word. Hatch, triangle and word carry it; colour is the last channel. */
export function Caution({ signal, children, onPlate, className }: Props) {
  const grave = signal === 'DANGER' || signal === 'WARNING'
  return (
    <div
      className={classes(
        'flex border-2',
        onPlate ? 'border-scribe' : grave ? 'border-nogo' : 'border-ink',
        className,
      )}
    >
      <span
        aria-hidden="true"
        className={classes(
          'hatch w-4 shrink-0 self-stretch',
          onPlate ? 'text-scribe2' : grave ? 'text-nogo' : 'text-ink',
        )}
      />
      <p className="min-w-0 flex-1 px-3 py-2 text-second">
        <strong className="caps mr-2 inline-flex items-center gap-1.5 text-section">
          {signal === 'NOTICE' ? null : <Triangle />}
          {signal}
        </strong>
        {children}
      </p>
    </div>
  )
}

function Triangle() {
  return (
    <svg viewBox="0 0 22 20" className="h-5 w-5.5" fill="none" aria-hidden="true">
      <path
        d="M11 2 20.5 18.5H1.5Z"
        stroke="currentColor"
        strokeWidth="2.6"
        strokeLinejoin="round"
      />
      <path d="M11 8V13M11 15V16.8" stroke="currentColor" strokeWidth="2.4" />
    </svg>
  )
}
