import type { Across, Verdict } from './verdict'

type Props = { verdict: Verdict | null; across?: Across; size?: number }

/** Two jaws and a blade: between them, beside them, or across a jaw with the part outside hollow. */
export function JawGlyph({ verdict, across = 'low', size = 28 }: Props) {
  return (
    <svg
      viewBox="0 0 52 28"
      width={(size * 52) / 28}
      height={size}
      aria-hidden="true"
      className="shrink-0 overflow-visible"
    >
      <path d="M11 3h6v22h-6M41 3h-6v22h6" fill="none" className="stroke-ink" strokeWidth="3.2" />
      <Blade verdict={verdict} across={across} />
    </svg>
  )
}

function Blade({ verdict, across }: { verdict: Verdict | null; across: Across }) {
  switch (verdict) {
    case 'in':
      return <rect x="21.5" y="5" width="9" height="18" className="fill-go" />
    case 'outLow':
      return <rect x="0" y="5" width="9" height="18" className="fill-nogo" />
    case 'outHigh':
      return <rect x="43" y="5" width="9" height="18" className="fill-nogo" />
    case 'tooClose':
      return <Undecided across={across} />
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

/** The part in the slot is solid, the part beyond a jaw hollow. */
function Undecided({ across }: { across: Across }) {
  return (
    <g className="fill-close stroke-close" strokeWidth="2.6">
      {across !== 'high' && (
        <rect x="7.3" y="6.3" width="8.4" height="15.4" className="fill-ground" />
      )}
      {across !== 'low' && (
        <rect x="36.3" y="6.3" width="8.4" height="15.4" className="fill-ground" />
      )}
      {across === 'low' && <rect x="16.5" y="6.3" width="8" height="15.4" />}
      {across === 'high' && <rect x="27.5" y="6.3" width="8" height="15.4" />}
      {across === 'both' && <rect x="16.5" y="6.3" width="19" height="15.4" />}
    </g>
  )
}
