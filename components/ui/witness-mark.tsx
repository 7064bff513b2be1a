import { classes } from './class-names'

/**
 * `opening`: the store is not counted yet, so the bolt is shown without its paint. `late`: there seems to
 * be a line, and nothing moves.
 */
export type WitnessState = 'opening' | 'whole' | 'broken' | 'sending' | 'late' | 'stuck'

type Props = {
  state: WitnessState
  /** Things not yet at the shop. */
  count: number
  /** Things given up on: with nothing left to send, the shop still does not have all. */
  letGo?: number
  /** Share of this sending that the shop has taken, 0 to 1. */
  progress?: number
  /** Opens the list of waiting work; without it the mark is a picture. */
  href?: string
  id?: string
  large?: boolean
}

/** The stripe of paint across a bolt and its seat: whole = nothing waits here, broken = look again. */
export function WitnessMark(props: Props) {
  const words = witnessWords(props.state, props.count, props.letGo ?? 0)
  if (props.href === undefined) {
    return (
      <span role="img" aria-label={words} className="inline-block shrink-0">
        <Drawing {...props} />
      </span>
    )
  }
  return (
    <a
      id={props.id}
      href={props.href}
      aria-label={words}
      className="block h-18 w-16 shrink-0 no-underline"
    >
      <Drawing {...props} />
    </a>
  )
}

/** What the mark says, in words. */
function witnessWords(state: WitnessState, count: number, letGo: number): string {
  switch (state) {
    case 'opening':
      return 'Counting what is not sent'
    case 'whole':
      return letGo === 0 ? 'All sent' : `Nothing waits, ${letGo} let go`
    case 'sending':
      return `Sending, ${count} not sent yet`
    case 'late':
      return `${count} not sent, and nothing moves`
    case 'stuck':
      return `${count} not sent, some of it is stuck`
    case 'broken':
      return `${count} not sent`
  }
}

const RING = 2 * Math.PI * 23

function Drawing({ state, count, progress = 0, large }: Props) {
  const digits = String(count)
  const width = 14 + 12 * digits.length
  return (
    <svg
      viewBox="0 0 64 72"
      className={classes(`witness-${state}`, large ? 'h-36 w-32' : 'h-18 w-16')}
      fill="none"
      aria-hidden="true"
    >
      <circle cx="32" cy="40" r="23" fill="var(--well)" stroke="var(--ink)" strokeWidth="2.6" />
      {state === 'sending' ? (
        <circle
          cx="32"
          cy="40"
          r="23"
          stroke="var(--paint)"
          strokeWidth="5"
          strokeDasharray={`${RING * Math.min(1, Math.max(0.04, progress))} ${RING}`}
          transform="rotate(-90 32 40)"
        />
      ) : null}
      <g className="witness-head">
        <path
          d="M32 22.5 47.2 31.2V48.8L32 57.5 16.8 48.8V31.2Z"
          fill="var(--ground)"
          stroke="var(--ink)"
          strokeWidth="2.8"
        />
        {state === 'opening' ? null : (
          <rect
            x="27"
            y="24.6"
            width="10"
            height="30.8"
            fill="var(--paint)"
            stroke="var(--paint-ink)"
            strokeWidth="2.4"
          />
        )}
      </g>
      {state === 'opening' ? null : (
        <>
          <Stub y={12.2} />
          <Stub y={57.2} />
        </>
      )}
      {state === 'stuck' || state === 'late' ? <Alarm word={state} /> : null}
      {count > 0 ? (
        <>
          <rect x={64 - width} y="0" width={width} height="24" fill="var(--ink)" />
          <text
            x={64 - width / 2}
            y="18"
            textAnchor="middle"
            fontSize="18"
            fill="var(--ground)"
            className="figures"
          >
            {digits}
          </text>
        </>
      ) : null}
    </svg>
  )
}

function Stub({ y }: { y: number }) {
  return (
    <rect
      x="27"
      y={y}
      width="10"
      height="10.6"
      fill="var(--paint)"
      stroke="var(--paint-ink)"
      strokeWidth="2.4"
    />
  )
}

function Alarm({ word }: { word: 'stuck' | 'late' }) {
  return (
    <g>
      <path
        d="M11 45 21 63H1Z"
        fill="var(--ground)"
        stroke="var(--nogo)"
        strokeWidth="2.8"
        strokeLinejoin="round"
      />
      <path d="M11 51V56.5M11 58.6V60.6" stroke="var(--nogo)" strokeWidth="2.4" />
      <rect x="22" y="56" width="42" height="16" fill="var(--ground)" />
      <text
        x="43"
        y="69.5"
        textAnchor="middle"
        fontSize="16"
        fontWeight="800"
        fontFamily="var(--font-display)"
        fill="var(--nogo)"
      >
        {word.toUpperCase()}
      </text>
    </g>
  )
}
