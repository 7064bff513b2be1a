'use client'
import { useId } from 'react'
import { fixed, shortUnit, THIN, twoDigits } from './figures'
import { RULE_HEIGHT, RuleDrawing } from './rule-drawing'
import { stripAxis } from './scale'
import { useWidth } from './use-width'
import {
  acrossOf,
  bandWords,
  distanceWords,
  placesOf,
  type StripReading,
  shownFigure,
  stripSentence,
} from './verdict'
import { VerdictLine } from './verdict-line'

const NEVER_NEGATIVE = new Set(['resistance', 'pressure', 'flow', 'length', 'time', 'acVoltage'])

type Props = {
  reading: StripReading
  /** One line: where the band comes from and how sure. */
  provenance: string
  /** Left out where the figure stands elsewhere (the reading screen draws its own). */
  figure?: boolean
}

/** A judged reading: figure, +-U, jaw glyph with verdict word and distance, the rule, and its provenance. */
export function ReadingStrip({ reading, provenance, figure = true }: Props) {
  return (
    <figure className="m-0">
      {figure && <ReadingFigure reading={reading} />}
      <div className="mt-1 flex flex-wrap items-center justify-between gap-x-3">
        <VerdictLine verdict={reading.verdict} across={acrossOf(reading)} large />
        <span className="text-second text-ink2">{distanceWords(reading)}</span>
      </div>
      <Rule reading={reading} />
      <figcaption className="mt-1 text-second text-ink2">{provenance}</figcaption>
    </figure>
  )
}

/** The figure as the meter showed it, and the uncertainty of what it means. */
export function ReadingFigure({ reading }: { reading: StripReading }) {
  return (
    <p className="flex flex-wrap items-baseline justify-between gap-x-3">
      <span>
        <span className="figures text-hero">{shownFigure(reading)}</span>
        <span className="text-section font-bold">
          {THIN}
          {reading.unit}
        </span>
      </span>
      <span className="figures text-section text-ink2">±{twoDigits(reading.expandedU).text}</span>
    </p>
  )
}

/** The rule alone, with its sentence for those who do not see it and the same data as a hidden table. */
export function Rule({ reading }: { reading: StripReading }) {
  const [ref, width] = useWidth<SVGSVGElement>(358)
  const hatch = `hatch-${useId().replaceAll(':', '')}`
  const axis = stripAxis(
    {
      value: reading.estimate,
      halfWidth: reading.overRange ? 0 : reading.expandedU,
      limits: reading.limits,
      neverNegative: NEVER_NEGATIVE.has(reading.quantity),
    },
    Math.max(3, Math.round(width / 76)),
  )
  return (
    <>
      <svg
        ref={ref}
        role="img"
        aria-label={stripSentence(reading)}
        viewBox={`0 0 ${width} ${RULE_HEIGHT}`}
        width="100%"
        height={RULE_HEIGHT}
        className="mt-1 block"
      >
        <RuleDrawing reading={reading} axis={axis} width={width} hatch={hatch} />
      </svg>
      <HiddenTable reading={reading} />
    </>
  )
}

function HiddenTable({ reading }: { reading: StripReading }) {
  const unit = shortUnit(reading.quantity)
  return (
    <div className="visually-hidden">
      <table>
        <thead>
          <tr>
            <th scope="col">Shown</th>
            <th scope="col">Best estimate, {unit}</th>
            <th scope="col">Plus or minus, {unit}</th>
            <th scope="col">Good band, {unit}</th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <td>
              {shownFigure(reading)} {reading.unit}
            </td>
            <td>{reading.overRange ? 'over range' : fixed(reading.estimate, placesOf(reading))}</td>
            <td>{twoDigits(reading.expandedU).text}</td>
            <td>{reading.limits === null ? 'none' : bandWords(reading.limits)}</td>
          </tr>
        </tbody>
      </table>
    </div>
  )
}
