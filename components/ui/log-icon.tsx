import type { ReactElement } from 'react'

/** Shapes of the job log: the shape says the kind, the word beside it says it again. */
export type LogShape = 'triangle' | 'diamond' | 'gauge' | 'frame' | 'hexagon' | 'flag' | 'ring'

const DRAWN: Record<LogShape, ReactElement> = {
  triangle: <path d="M12 3 22 21H2Z" />,
  diamond: <path d="M12 2 22 12 12 22 2 12Z" />,
  gauge: (
    <>
      <circle cx="12" cy="12" r="9.8" />
      <path d="M12 12.5 16 7" fill="none" />
    </>
  ),
  frame: (
    <>
      <path d="M2.5 4H21.5V20H2.5Z" />
      <circle cx="12" cy="12" r="3.6" />
    </>
  ),
  hexagon: <path d="M7 3.4H17L22 12 17 20.6H7L2 12Z" />,
  flag: <path d="M3 3H15L21.5 12 15 21H3Z" fill="var(--ink)" />,
  ring: <circle cx="12" cy="12" r="8.6" />,
}

type Props = {
  shape: LogShape /** A correction repeats the shape with a bar. */
  bar?: boolean
  className?: string
}

/** One shape of the set, 24 units, no fill but the well (the flag is solid). */
export function LogIcon({ shape, bar = false, className = 'size-7' }: Props) {
  return (
    <svg
      viewBox="-1 -1 26 26"
      className={className}
      fill="var(--well)"
      stroke="var(--ink)"
      strokeWidth="2.8"
      strokeLinejoin="miter"
      aria-hidden="true"
    >
      {DRAWN[shape]}
      {bar ? <path d="M-0.5 24.5 24.5 -0.5" stroke="var(--ink)" strokeWidth="3.2" /> : null}
    </svg>
  )
}
