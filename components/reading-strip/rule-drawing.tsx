import { type Axis, beamParts, type Limits, xOf } from './scale'
import type { StripReading } from './verdict'
import { plain } from './verdict'

const TOP = 44
const FLOOR = 88
const LINE = 97
const HEIGHT = 134
const TICK = { long: 17, mid: 12, short: 8 }
const DIGIT = 9.4

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
      <Jaws axis={axis} limits={reading.limits} width={width} />
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

function Jaws({ axis, limits, width }: Part) {
  const low = limits?.low ?? null
  const high = limits?.high ?? null
  const xs = labelPlaces(
    [low, high]
      .filter((x): x is number => x !== null)
      .map((x) => ({ x: xOf(axis, x, width), text: plain(x) })),
    width,
  )
  return (
    <g>
      {low !== null && <Jaw x={xOf(axis, low, width)} side={-1} />}
      {high !== null && <Jaw x={xOf(axis, high, width)} side={1} />}
      {xs.map((mark) => (
        <text
          key={mark.text}
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

/** Two limit figures that would touch are moved apart and kept on the strip. */
export function labelPlaces(marks: { x: number; text: string }[], width: number) {
  const half = (text: string) => (text.length * DIGIT * 1.06) / 2
  const keep = (x: number, text: string) => Math.min(width - half(text), Math.max(half(text), x))
  const [a, b] = marks
  if (a === undefined || b === undefined) return marks.map((m) => ({ ...m, x: keep(m.x, m.text) }))
  const need = half(a.text) + half(b.text) + 8
  const gap = Math.max(0, need - (b.x - a.x)) / 2
  const left = keep(a.x - gap, a.text)
  const right = keep(Math.max(b.x + gap, left + need), b.text)
  return [
    { ...a, x: Math.min(left, right - need) },
    { ...b, x: right },
  ]
}

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
  const input = {
    value: reading.estimate,
    halfWidth: reading.expandedU,
    limits: reading.limits,
    neverNegative: false,
  }
  const parts = reading.overRange ? [] : beamParts(axis, input, { width, minPx: 12 })
  const left = parts[0]?.from ?? x
  const right = parts.at(-1)?.to ?? x
  const mid = (TOP + FLOOR) / 2
  return (
    <g>
      <path
        d={`M${left} ${mid - 15}V${mid + 15}M${right} ${mid - 15}V${mid + 15}M${left} ${mid}H${right}`}
        className="stroke-ground"
        strokeWidth="20"
        strokeLinecap="square"
        opacity={parts.length === 0 ? 0 : 1}
      />
      <path d={`M${x} ${TOP - 2}V${LINE + 12}`} className="stroke-ground" strokeWidth="10" />
      {parts.map((part) => (
        <rect
          key={part.from}
          x={part.from + (part.hollow ? 1.3 : 0)}
          y={mid - (part.hollow ? 8.2 : 9.5)}
          width={Math.max(0, part.to - part.from - (part.hollow ? 2.6 : 0))}
          height={part.hollow ? 16.4 : 19}
          className={part.hollow ? `fill-ground ${stroke}` : fill}
          strokeWidth={part.hollow ? 2.6 : 0}
        />
      ))}
      {parts.length > 0 && (
        <path
          d={`M${left + 1.5} ${mid - 16}v32M${right - 1.5} ${mid - 16}v32`}
          className={stroke}
          strokeWidth="3.4"
        />
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
          d={`M${x - 26} ${mid - 11}l14 11l-14 11`}
          fill="none"
          className={stroke}
          strokeWidth="5"
        />
      )}
    </g>
  )
}
