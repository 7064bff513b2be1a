/**
 * The budget of one reading after JCGM 100 (GUM) 4.3.7: every source is a rectangular error with a
 * half-width a and u = a / sqrt(3); independent sources add in square. The widening of a cold or hot meter
 * grows the same error as its accuracy, so those two lines add up straight, not in square (rule R7).
 */

import type { ReadingBody } from '@/lib/model/log-entry'
import type { SpecValue } from '@/lib/model/machine-model'
import { copperAt } from './copper'
import { type Condition, conditionWidths } from './reading-conditions'

/** What a verdict needs. `conditions` are those the limit holds for; `extra` further half-widths with their names. */
export type ReadingInput = Pick<
  ReadingBody,
  | 'quantity'
  | 'value'
  | 'overRange'
  | 'meterFunction'
  | 'leadsOhm'
  | 'nulled'
  | 'partTempC'
  | 'meterTempC'
  | 'perKelvin'
> & {
  spec: SpecValue | null
  conditions?: readonly Condition[]
  extra?: readonly { source: string; halfWidth: number }[]
  /** The maker states that nulling takes the meter's own offset away too: only gain, steps and contact remain. */
  nullCancels?: boolean
}

/** Where a share of the uncertainty comes from, in the kept unit; `share` of the variance (0 to 1, sum 1). */
export type BudgetLine = { source: string; halfWidth: number; standardU: number; share: number }

/** A reading's estimate and its uncertainty, in the kept unit; `worst` is the straight sum of the half-widths. */
export type Budget = { estimate: number; lines: BudgetLine[]; standardU: number; worst: number }

/** Half-width assumed for a copper part whose temperature was not taken, in kelvin (common practice, no source). */
export const UNKNOWN_PART_TEMP_K = 20
/** How far an NTC's resistance moves per kelvin near -20 C (rule R7), and how well its temperature is known. */
export const NTC_PER_KELVIN = 0.06
/** How well an NTC's temperature is known, in kelvin (common practice, no source). */
export const NTC_TEMP_K = 1

/** Names of the budget's own lines; conditions carry the name they are given. */
export const SOURCES = {
  meter: 'Meter accuracy',
  meterTemp: 'Meter temperature',
  leads: 'Test leads',
  step: 'Display step',
  nullStep: 'Display step when nulled',
  contact: 'Contact when nulled',
  partTemp: 'Part temperature',
} as const

/** The corrected estimate, the budget by source, the combined u and the straight sum of the half-widths. */
export function budgetOf(input: ReadingInput): Budget {
  const shown = input.value - leadMiddle(input)
  const factor = temperatureFactor(input)
  const widths: Width[] = [
    ...meterWidths(input).map((w) => ({ ...w, halfWidth: w.halfWidth * factor })),
    ...leadWidths(input).map((w) => ({ ...w, halfWidth: w.halfWidth * factor })),
    ...partTempWidths(input, shown * factor),
    ...conditionWidths(shown * factor, input.conditions ?? []),
    ...(input.extra ?? []).map((e) => ({ source: e.source, halfWidth: Math.abs(e.halfWidth) })),
  ].filter((w) => w.halfWidth > 0)
  const variance = groups(widths).reduce((sum, a) => sum + (a * a) / 3, 0)
  return {
    estimate: shown * factor,
    lines: withShares(widths, variance),
    standardU: Math.sqrt(variance),
    worst: widths.reduce((sum, w) => sum + w.halfWidth, 0),
  }
}

/** The half-widths of the independent rectangles behind a budget: meter and meter temperature are one. */
export function rectangles(lines: readonly Pick<BudgetLine, 'source' | 'halfWidth'>[]): number[] {
  return groups(lines)
}

/** Kelvins by which the meter lies outside 18 to 28 C; 0 inside, and 0 when its temperature was not taken. */
export function kelvinsOutside(meterTempC: number | null): number {
  if (meterTempC === null) return 0
  return Math.max(0, 18 - meterTempC, meterTempC - 28)
}

/** Limits in force: the sheet's own win over nominal and tolerance; null when the sheet gives neither. */
export function limitsOf(
  spec: SpecValue | null,
): { low: number | null; high: number | null } | null {
  if (spec === null) return null
  if (spec.low !== null || spec.high !== null) return { low: spec.low, high: spec.high }
  if (spec.nominal === null || spec.tolerancePercent === null) return null
  const half = (Math.abs(spec.nominal) * spec.tolerancePercent) / 100
  return { low: spec.nominal - half, high: spec.nominal + half }
}

type Width = { source: string; halfWidth: number }

const hasLeads = (input: ReadingInput) => input.quantity === 'resistance'

const leadMiddle = (input: ReadingInput): number =>
  hasLeads(input) && !input.nulled ? (input.leadsOhm.low + input.leadsOhm.high) / 2 : 0

function temperatureFactor({ spec, partTempC }: ReadingInput): number {
  if (spec?.material !== 'copper' || spec.partTempC === null || partTempC === null) return 1
  return copperAt(1, partTempC, spec.partTempC)
}

function meterWidths(input: ReadingInput): Width[] {
  const { percent, digits, resolution } = input.meterFunction
  const gain = (percent / 100) * Math.abs(input.value)
  const nulled = hasLeads(input) && input.nulled
  const accuracy = gain + (nulled && input.nullCancels === true ? 0 : digits * resolution)
  const widths: Width[] = [
    { source: SOURCES.meter, halfWidth: accuracy },
    {
      source: SOURCES.meterTemp,
      halfWidth: accuracy * input.perKelvin * kelvinsOutside(input.meterTempC),
    },
  ]
  if (nulled || digits === 0) widths.push({ source: SOURCES.step, halfWidth: resolution / 2 })
  if (nulled) widths.push({ source: SOURCES.nullStep, halfWidth: resolution / 2 })
  if (nulled && input.nullCancels === true)
    widths.push({ source: SOURCES.contact, halfWidth: resolution / 2 })
  return widths
}

function leadWidths(input: ReadingInput): Width[] {
  if (!hasLeads(input) || input.nulled) return []
  return [
    { source: SOURCES.leads, halfWidth: Math.abs(input.leadsOhm.high - input.leadsOhm.low) / 2 },
  ]
}

function partTempWidths({ spec, partTempC }: ReadingInput, estimate: number): Width[] {
  if (spec === null || spec.partTempC === null || spec.material === null) return []
  const size = Math.abs(estimate)
  if (spec.material === 'copper') {
    if (partTempC !== null) return []
    const far = copperAt(1, 20 + UNKNOWN_PART_TEMP_K, 20)
    return [{ source: SOURCES.partTemp, halfWidth: size * (1 / far - 1) }]
  }
  const kelvins =
    partTempC === null ? UNKNOWN_PART_TEMP_K : Math.abs(partTempC - spec.partTempC) + NTC_TEMP_K
  return [{ source: SOURCES.partTemp, halfWidth: size * NTC_PER_KELVIN * kelvins }]
}

/**
 * Half-widths by which the difference of two readings may be off for the temperatures of their parts. Both
 * taken: copper is corrected; an NTC keeps what each is known to, and how far apart the two are. Else each
 * keeps its own line.
 */
export function partTempsApart(a: ReadingInput, b: ReadingInput): number[] {
  const widths = [a, b].map((of) => {
    const { estimate } = budgetOf(of)
    return { of, size: Math.abs(estimate), own: partTempWidths(of, estimate) }
  })
  if (a.partTempC === null || b.partTempC === null)
    return widths.flatMap(({ own }) => own.map((w) => w.halfWidth))
  const apart = Math.abs(a.partTempC - b.partTempC)
  const ntc = widths.filter(({ own }) => own.length > 0)
  const known = ntc.map(({ size }) => size * NTC_PER_KELVIN * NTC_TEMP_K)
  const between = Math.max(0, ...ntc.map(({ size }) => size)) * NTC_PER_KELVIN * apart
  return [...known, between]
}

function groups(widths: readonly Width[]): number[] {
  const joined = widths
    .filter((w) => w.source === SOURCES.meter || w.source === SOURCES.meterTemp)
    .reduce((sum, w) => sum + w.halfWidth, 0)
  const others = widths.filter((w) => w.source !== SOURCES.meter && w.source !== SOURCES.meterTemp)
  return [joined, ...others.map((w) => w.halfWidth)].filter((a) => a > 0)
}

/** Shares of the variance; the two joined lines split theirs in proportion to their half-widths. */
function withShares(widths: readonly Width[], variance: number): BudgetLine[] {
  const isMeter = (w: Width) => w.source === SOURCES.meter || w.source === SOURCES.meterTemp
  const joined = widths.filter(isMeter).reduce((sum, w) => sum + w.halfWidth, 0)
  return widths.map((w) => {
    const part = isMeter(w) ? w.halfWidth * joined : w.halfWidth * w.halfWidth
    return {
      source: w.source,
      halfWidth: w.halfWidth,
      standardU: w.halfWidth / Math.sqrt(3),
      share: variance > 0 ? part / 3 / variance : 0,
    }
  })
}
