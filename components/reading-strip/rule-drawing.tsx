import { type Axis, beamParts, type Limits, xOf } from './scale'
import type { StripReading } from './verdict'
import { plain } from './verdict'

const TOP = 42
const FLOOR = 84
const MID = 63
const LINE = 93
const HEIGHT = 126
const TICK = { long: 17, mid: 12, short: 8 }
const DIGIT = 9.4
/** Half the pentagon and some air, in px. */
const POINTER_HALF = 15

/** The steel rule of one reading: jaws, hatch, scale, blade and I-beam. Pure drawing, no words of its own. */
export function RuleDrawing({ reading, axis, width, hatch }: Drawing & { hatch: string }) {
  return (
    <>
      <defs>
        <pattern
          id={hatch}
          width="6"
          height="6"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <rect width="2.2" height="6" className="fill-ink" />
        </pattern>
      </defs>
      <Slot axis={axis} limits={reading.limits} width={width} hatch={hatch} />
      <Scale axis={axis} width={width} />
      <Jaws
        axis={axis}
        limits={reading.limits}
        width={width}
        pointer={xOf(axis, reading.estimate, width)}
      />
      <Blade reading={reading} axis={axis} width={width} />
    </>
  )
}
export const RULE_HEIGHT = HEIGHT

type Drawing = { reading: StripReading; axis: Axis; width: number }
type Part = { axis: Axis; limits: Limits | null; width: number }

function Slot({ axis, limits, width, hatch }: Part & { hatch: string }) {
  const low = limits?.low ?? null
  const high = limits?.high ?? null
  const left = low === null ? 0 : xOf(axis, low, width)
  const right = high === null ? width : xOf(axis, high, width)
  return (
    <g>
      <rect
        x={left}
        y={TOP}
        width={Math.max(0, right - left)}
        height={FLOOR - TOP}
        className="fill-well"
      />
      {low !== null && <Outside from={0} to={left} hatch={hatch} />}
      {high !== null && <Outside from={right} to={width} hatch={hatch} />}
    </g>
  )
}

function Outside({ from, to, hatch }: { from: number; to: number; hatch: string }) {
  if (to - from < 0.5) return null
  return (
    <g>
      <rect x={from} y={TOP} width={to - from} height={FLOOR - TOP} fill={`url(#${hatch})`} />
      <path
        d={`M${from} ${TOP}H${to}M${from} ${FLOOR}H${to}`}
        className="stroke-ink"
        strokeWidth="2.4"
      />
    </g>
  )
}

function Jaws({ axis, limits, width, pointer }: Part & { pointer: number }) {
  const low = limits?.low ?? null
  const high = limits?.high ?? null
  const marks = [
    low === null ? null : { x: xOf(axis, low, width), text: plain(low), side: -1 as const },
    high === null ? null : { x: xOf(axis, high, width), text: plain(high), side: 1 as const },
  ].filter((mark) => mark !== null)
  return (
    <g>
      {marks.map((mark) => (
        <Jaw key={mark.side} x={mark.x} side={mark.side} />
      ))}
      {labelPlaces(marks, width, pointer).map((mark) => (
        <text
          key={mark.side}
          x={mark.x}
          y={TOP - 9}
          textAnchor="middle"
          className="figures fill-ink"
          fontSize="17"
        >
          {mark.text}
        </text>
      ))}
    </g>
  )
}

/** A jaw stands outside its limit; its slanted foot points into the slot's edge. */
function Jaw({ x, side }: { x: number; side: 1 | -1 }) {
  const w = 12 * side
  return (
    <path
      d={`M${x} ${TOP - 1.2}V${FLOOR + 7}L${x + w} ${FLOOR}V${TOP - 1.2}Z`}
      className="fill-ink"
    />
  )
}

type LimitMark = { x: number; text: string; side: 1 | -1 }

/** Limit figures stand over their jaws, out of the pointer's way, off each other and on the strip. */
export function labelPlaces(marks: LimitMark[], width: number, pointer: number): LimitMark[] {
  const half = (text: string) => (text.length * DIGIT * 1.08) / 2
  const placed = marks.map((mark) => {
    const need = half(mark.text) + POINTER_HALF
    const free = Math.abs(mark.x - pointer) >= need
    return { ...mark, x: free ? mark.x : pointer + mark.side * need }
  })
  const kept = placed.map((mark) => ({ ...mark, x: onStrip(mark.x, half(mark.text), width) }))
  const [a, b] = kept
  if (a === undefined || b === undefined) return kept
  const need = half(a.text) + half(b.text) + 8
  const short = Math.max(0, need - (b.x - a.x))
  a.x = onStrip(a.x - short / 2, half(a.text), width)
  b.x = onStrip(Math.max(b.x, a.x + need), half(b.text), width)
  a.x = Math.min(a.x, b.x - need)
  return kept
}

const onStrip = (x: number, half: number, width: number): number =>
  Math.min(width - half, Math.max(half, x))

function Scale({ axis, width }: { axis: Axis; width: number }) {
  return (
    <g>
      <path d={`M0 ${LINE}H${width}`} className="stroke-ink" strokeWidth="2.4" />
      {axis.ticks.map((tick) => (
        <path
          key={tick.at}
          d={`M${xOf(axis, tick.at, width)} ${LINE}v${TICK[tick.kind]}`}
          className="stroke-ink"
          strokeWidth={tick.kind === 'long' ? 2.6 : 2}
        />
      ))}
      {axis.ticks.map((tick) => {
        if (tick.label === null) return null
        const x = xOf(axis, tick.at, width)
        const half = (tick.label.length * DIGIT) / 2
        if (x < half - 4 || x > width - half + 4) return null
        return (
          <text
            key={tick.at}
            x={Math.min(width - half, Math.max(half, x))}
            y={HEIGHT - 4}
            textAnchor="middle"
            className="figures fill-ink2"
            fontSize="16"
          >
            {tick.label}
          </text>
        )
      })}
    </g>
  )
}

const FILL = { in: 'fill-go', outLow: 'fill-nogo', outHigh: 'fill-nogo', tooClose: 'fill-close' }
const STROKE = {
  in: 'stroke-go',
  outLow: 'stroke-nogo',
  outHigh: 'stroke-nogo',
  tooClose: 'stroke-close',
}

/** Pentagon, blade and I-beam, each with a ground halo so that they read on hatch. */
function Blade({ reading, axis, width }: Drawing) {
  const fill = reading.verdict === null ? 'fill-ink' : FILL[reading.verdict]
  const stroke = reading.verdict === null ? 'stroke-ink' : STROKE[reading.verdict]
  const x = Math.min(width - 3, Math.max(3, xOf(axis, reading.estimate, width)))
  return (
    <g>
      <path d={`M${x} ${TOP - 2}V${LINE + 12}`} className="stroke-ground" strokeWidth="10" />
      {!reading.overRange && (
        <Beam reading={reading} axis={axis} width={width} fill={fill} stroke={stroke} />
      )}
      <path d={`M${x} ${TOP - 2}V${LINE + 11}`} className={stroke} strokeWidth="4.5" />
      <path
        d={`M${x - 11.5} 6h23v13l-11.5 9l-11.5-9Z`}
        className={`${fill} stroke-ground`}
        strokeWidth="3"
        paintOrder="stroke"
      />
      {reading.overRange && (
        <path
          d={`M${x - 26} ${MID - 11}l14 11l-14 11`}
          fill="none"
          className={stroke}
          strokeWidth="5"
        />
      )}
    </g>
  )
}

/** As wide as +-U: solid within the limits, hollow beyond one. */
function Beam({ reading, axis, width, fill, stroke }: Drawing & { fill: string; stroke: string }) {
  const parts = beamParts(
    axis,
    { value: reading.estimate, halfWidth: reading.expandedU, limits: reading.limits },
    { width, minPx: 12 },
  )
  const left = parts[0]?.from ?? 0
  const right = parts.at(-1)?.to ?? 0
  const caps = `M${left + 1.5} ${MID - 16}v32M${right - 1.5} ${MID - 16}v32`
  return (
    <g>
      <path d={caps} className="stroke-ground" strokeWidth="9" />
      <rect x={left} y={MID - 12.5} width={right - left} height="25" className="fill-ground" />
      {parts.map((part) => (
        <rect
          key={part.from}
          x={part.from + (part.hollow ? 1.3 : 0)}
          y={MID - (part.hollow ? 8.2 : 9.5)}
          width={Math.max(0, part.to - part.from - (part.hollow ? 2.6 : 0))}
          height={part.hollow ? 16.4 : 19}
          className={part.hollow ? `fill-ground ${stroke}` : fill}
          strokeWidth={part.hollow ? 2.6 : 0}
        />
      ))}
      <path d={caps} className={stroke} strokeWidth="3.4" />
    </g>
  )
}
