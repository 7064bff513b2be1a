import type { Verdict } from './verdict'

/** Two jaws and a blade: between them, beside them, or across a jaw with the part outside hollow. */
export function JawGlyph({ verdict, size = 28 }: { verdict: Verdict | null; size?: number }) {
  return (
    <svg
      viewBox="0 0 52 28"
      width={(size * 52) / 28}
      height={size}
      aria-hidden="true"
      className="shrink-0 overflow-visible"
    >
      <path d="M11 3h6v22h-6M41 3h-6v22h6" fill="none" className="stroke-ink" strokeWidth="3.2" />
      <Blade verdict={verdict} />
    </svg>
  )
}

function Blade({ verdict }: { verdict: Verdict | null }) {
  switch (verdict) {
    case 'in':
      return <rect x="21.5" y="5" width="9" height="18" className="fill-go" />
    case 'outLow':
      return <rect x="0" y="5" width="9" height="18" className="fill-nogo" />
    case 'outHigh':
      return <rect x="43" y="5" width="9" height="18" className="fill-nogo" />
    case 'tooClose':
      return (
        <g className="fill-close stroke-close" strokeWidth="2.6">
          <rect x="10.3" y="6.3" width="6.7" height="15.4" className="fill-ground" />
          <rect x="17" y="6.3" width="6.7" height="15.4" />
        </g>
      )
    case null:
      return (
        <path
          d="M23 10a3.4 3.4 0 1 1 4.4 3.3c-1 .4-1.4 1-1.4 2.4M26 19.4v2"
          fill="none"
          className="stroke-ink2"
          strokeWidth="2.6"
        />
      )
  }
}
