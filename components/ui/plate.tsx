import type { ReactNode } from 'react'
import { classes } from './class-names'

/** The layout-blue plate with a registration cross at each corner: what to do next. */
export function Plate({ children, className }: { children: ReactNode; className?: string }) {
  return (
    <div className={classes('plate p-4', className)}>
      <Cross at="-top-2.5 -left-2.5" />
      <Cross at="-top-2.5 -right-2.5" />
      <Cross at="-bottom-2.5 -left-2.5" />
      <Cross at="-bottom-2.5 -right-2.5" />
      {children}
    </div>
  )
}

function Cross({ at }: { at: string }) {
  return (
    <svg
      viewBox="0 0 18 18"
      className={classes('plate-cross no-print', at)}
      fill="none"
      aria-hidden="true"
    >
      <circle cx="9" cy="9" r="5.5" stroke="currentColor" strokeWidth="1.4" />
      <path d="M9 0V18M0 9H18" stroke="currentColor" strokeWidth="1.4" />
    </svg>
  )
}
