'use client'

import { useId } from 'react'
import { useWidth } from '@/components/reading-strip/use-width'
import type { Light, Span } from '@/lib/diag/light'
import { clockTime } from '../../field/times'
import { useDesk } from '../desk-context'
import type { DayWindow } from './day-window'

const SKY = 128
const HEIGHT = SKY + 42
const QUARTER_MS = 15 * 60_000

type Props = { day: DayWindow; now: number; light: Light }

/** A rule of hours with the sun's height over it; dusk hatched, dark solid. */
export function DaylightRule({ day, now, light }: Props) {
  const [ref, width] = useWidth<SVGSVGElement>(326)
  const { shop } = useDesk()
  const hatch = `dusk-${useId().replaceAll(':', '')}`
  const x = (at: number) => ((at - day.from) / (day.to - day.from)) * width
  const y = heightScale(day)
  const time = (ms: number) => clockTime(new Date(ms).toISOString(), shop.zone)
  const sun = day.curve.reduce((a, b) => (Math.abs(b.at - now) < Math.abs(a.at - now) ? b : a))
  return (
    <svg
      ref={ref}
      role="img"
      aria-label={sentence(light, time)}
      viewBox={`0 0 ${width} ${HEIGHT}`}
      width="100%"
      height={HEIGHT}
      className="mt-2 block"
    >
      <defs>
        <pattern
          id={hatch}
          width="6"
          height="6"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <line x1="3" y1="0" x2="3" y2="6" className="stroke-ink2" strokeWidth="2.2" />
        </pattern>
      </defs>
      <rect x="0" y="0" width={width} height={SKY} className="fill-well" />
      <path d={path(day, x, y)} className="fill-none stroke-ink" strokeWidth="2.6" />
      <line
        x1="0"
        x2={width}
        y1={y(0)}
        y2={y(0)}
        className="stroke-ink"
        strokeWidth="2"
        strokeDasharray="2 5"
      />
      {day.twilights.map((span) => (
        <Block key={span.from} span={span} x={x} fill={`url(#${hatch})`} />
      ))}
      {day.nights.map((span) => (
        <Night
          key={span.from}
          span={span}
          x={x}
          words={time(light.kind === 'light' ? light.dusk : span.from)}
        />
      ))}
      <Hours day={day} x={x} time={time} width={width} />
      <line
        x1={x(now)}
        x2={x(now)}
        y1={y(sun.height)}
        y2={SKY + 14}
        className="stroke-ink"
        strokeWidth="2.6"
      />
      <circle
        cx={x(now)}
        cy={y(sun.height)}
        r="15"
        className="fill-paint stroke-paintInk"
        strokeWidth="2.8"
      />
    </svg>
  )
}

/** Degrees to pixels: the highest sun of the window near the top, the horizon always inside. */
function heightScale(day: DayWindow) {
  const top = Math.max(12, ...day.curve.map(({ height }) => height)) + 4
  const bottom = -10
  return (height: number) => {
    const share = (top - Math.max(bottom, height)) / (top - bottom)
    return 6 + share * (SKY - 12)
  }
}

const path = (day: DayWindow, x: (at: number) => number, y: (height: number) => number) =>
  day.curve
    .map(({ at, height }, i) => `${i === 0 ? 'M' : 'L'}${x(at).toFixed(1)} ${y(height).toFixed(1)}`)
    .join('')

type BlockProps = { span: Span; x: (at: number) => number; fill: string }

function Block({ span, x, fill }: BlockProps) {
  return <rect x={x(span.from)} y="0" width={x(span.to) - x(span.from)} height={SKY} fill={fill} />
}

function Night({ span, x, words }: { span: Span; x: (at: number) => number; words: string }) {
  const width = x(span.to) - x(span.from)
  const middle = x(span.from) + width / 2
  return (
    <g>
      <rect
        x={x(span.from)}
        y="0"
        width={width}
        height={SKY}
        className="fill-dark stroke-ink"
        strokeWidth="2"
      />
      {width > 50 ? (
        <g className="fill-darkInk" textAnchor="middle">
          <text x={middle} y="26" className="caps" fontSize="22">
            Dark
          </text>
          <text x={middle} y="50" className="figures" fontSize="16">
            {words}
          </text>
        </g>
      ) : null}
    </g>
  )
}

type HoursProps = {
  day: DayWindow
  x: (at: number) => number
  time: (ms: number) => string
  width: number
}

/** Ticks each quarter of an hour, long ones on the hour, every second hour named. */
function Hours({ day, x, time, width }: HoursProps) {
  const ticks: { at: number; hour: number | null }[] = []
  for (let at = Math.ceil(day.from / QUARTER_MS) * QUARTER_MS; at <= day.to; at += QUARTER_MS) {
    const [hour, minute] = time(at).split(':').map(Number)
    ticks.push({ at, hour: minute === 0 ? (hour ?? null) : null })
  }
  const every = (day.to - day.from) / 3_600_000 > 14 ? 4 : 2
  const named = ({ at, hour }: (typeof ticks)[number]) =>
    hour !== null && hour % every === 0 && x(at) > 14 && x(at) < width - 14
  return (
    <g>
      <line x1="0" x2={width} y1={SKY} y2={SKY} className="stroke-ink" strokeWidth="2.6" />
      {ticks.map(({ at, hour }) => (
        <line
          key={at}
          x1={x(at)}
          x2={x(at)}
          y1={SKY}
          y2={SKY + (hour === null ? 7 : 14)}
          className="stroke-ink"
          strokeWidth="2"
        />
      ))}
      {ticks.filter(named).map(({ at, hour }) => (
        <text
          key={at}
          x={x(at)}
          y={SKY + 33}
          textAnchor="middle"
          className="figures fill-ink2"
          fontSize="16"
        >
          {String(hour).padStart(2, '0')}
        </text>
      ))}
    </g>
  )
}

function sentence(light: Light, time: (ms: number) => string): string {
  if (light.kind === 'never') return 'The sun’s height over the hours around now.'
  if (light.kind === 'dark') return `Dark there until civil dawn at ${time(light.dawn)}.`
  const sunset = light.sunset ? `sunset ${time(light.sunset)}, ` : ''
  return `Light there: ${sunset}dark from ${time(light.dusk)}.`
}
