import { type ReactNode, useId } from 'react'
import { classes } from './class-names'

type Props = {
  children: ReactNode
  level?: 2 | 3
  /** Words at the far end, e.g. a count. */
  end?: ReactNode
  id?: string
  className?: string
  onPlate?: boolean
}

/** A section heading with a strip of ticks: the only divider that means "new section". */
export function RuleEdge({ children, level = 2, end, id, className }: Props) {
  const Heading = level === 2 ? 'h2' : 'h3'
  return (
    <div className={classes('flex items-end gap-3', className)}>
      <Heading id={id} tabIndex={-1} className="caps max-w-full text-section">
        {children}
      </Heading>
      <Ticks />
      {end ? <span className="figures shrink-0 text-second text-ink2">{end}</span> : null}
    </div>
  )
}

/** The tick strip alone: 8 px pitch, a long one each 40. */
function Ticks({ className }: { className?: string }) {
  const id = useId()
  return (
    <svg
      className={classes('h-4 min-w-6 flex-1 text-ink', className)}
      width="100%"
      height="16"
      aria-hidden="true"
    >
      <defs>
        <pattern id={id} width="40" height="16" patternUnits="userSpaceOnUse">
          <path
            d="M1 0V16M9 8V16M17 8V16M25 8V16M33 8V16"
            stroke="currentColor"
            strokeWidth="2"
            fill="none"
          />
        </pattern>
      </defs>
      <rect width="100%" height="16" fill={`url(#${id})`} />
      <line x1="0" x2="100%" y1="15" y2="15" stroke="currentColor" strokeWidth="2" />
    </svg>
  )
}
