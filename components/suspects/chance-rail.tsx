'use client'
import { useWidth } from '../reading-strip/use-width'
import { MarkSign } from './mark-sign'
import type { Mark } from './outlook-words'

const HEIGHT = 50
const BASE = 42
const BAR = 20
const MARK_Y = 11
/** A mark keeps this far from the rail's ends and from the next mark, in px. */
const EDGE = 9
const APART = 18

/** A rail of 100 with a tick each 10, the bar to the chance, and over it where each outcome would put it. */
export function ChanceRail({ chance, marks }: { chance: number; marks: readonly Mark[] }) {
  const [ref, width] = useWidth<SVGSVGElement>(358)
  const x = (share: number) => 1 + Math.min(1, Math.max(0, share)) * (width - 2)
  const at = spread(marks, x, width)
  const xs = at.map((mark) => mark.x)
  const top = marks.length === 0 ? 18 : 0
  return (
    <svg
      ref={ref}
      viewBox={`0 ${top} ${width} ${HEIGHT - top}`}
      width="100%"
      height={HEIGHT - top}
      className="block"
      aria-hidden="true"
    >
      <rect x="0" y={BASE - BAR} width={x(chance)} height={BAR} className="fill-bar" />
      <Rail width={width} x={x} />
      {xs.length > 0 && (
        <path
          d={`M${Math.min(...xs)} ${MARK_Y}H${Math.max(...xs)}`}
          className="stroke-ink"
          strokeWidth="2.2"
        />
      )}
      {at.map((mark) => (
        <g key={mark.outcome}>
          <Stem mark={mark} from={x(mark.chance)} />
          <g transform={`translate(${mark.x} ${MARK_Y})`}>
            <MarkSign shape={mark.shape} />
          </g>
        </g>
      ))}
    </svg>
  )
}

type Placed = Mark & { x: number }

/** Marks that would lie on each other are moved apart; their feet stay at the true place. */
export function spread(
  marks: readonly Mark[],
  x: (share: number) => number,
  width: number,
): Placed[] {
  const sorted = marks
    .map((mark) => ({ ...mark, x: Math.min(width - EDGE, Math.max(EDGE, x(mark.chance))) }))
    .sort((a, b) => a.x - b.x)
  sorted.forEach((mark, i) => {
    const before = sorted[i - 1]
    if (before !== undefined) mark.x = Math.max(mark.x, before.x + APART)
  })
  const over = Math.max(0, (sorted.at(-1)?.x ?? 0) - (width - EDGE))
  for (let i = sorted.length - 1; over > 0 && i >= 0; i--) {
    const mark = sorted[i]
    const limit = (sorted[i + 1]?.x ?? width - EDGE + APART) - APART
    if (mark !== undefined) mark.x = Math.min(mark.x, limit)
  }
  return sorted
}

function Rail({ width, x }: { width: number; x: (share: number) => number }) {
  const tens = Array.from({ length: 11 }, (_, i) => i)
  return (
    <g className="stroke-ink">
      <path d={`M0 ${BASE}H${width}`} strokeWidth="2.4" />
      {tens.map((ten) => (
        <path
          key={ten}
          d={`M${x(ten / 10)} ${BASE}v${ten % 5 === 0 ? -11 : -6}`}
          strokeWidth={ten % 5 === 0 ? 2.4 : 2}
        />
      ))}
    </g>
  )
}

const STEM: Record<Mark['shape'], string> = {
  ring: 'stroke-go',
  cross: 'stroke-nogo',
  diamond: 'stroke-close',
  square: 'stroke-close',
}

/** The foot of a mark, with a ground halo so that it reads on the bar. */
function Stem({ mark, from }: { mark: Mark & { x: number }; from: number }) {
  const d = `M${mark.x} ${MARK_Y + 8}L${from} ${BASE - 9}`
  return (
    <>
      <path d={d} className="stroke-ground" strokeWidth="7" />
      <path d={d} className={STEM[mark.shape]} strokeWidth="3" />
    </>
  )
}
