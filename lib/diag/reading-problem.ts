/**
 * What no reading can be, by the field that says it: not a number, below nothing, outside what a field meter, a
 * part or a figure ever has (the bounds are generous; guess). So no NaN comes out of a budget, whatever a draft,
 * an old phone or a file holds.
 */
import { type Bounded, eachWithin, type FigureProblem, unfit } from './figure-bounds'
import type { ReadingInput } from './reading-budget'
import { neverNegative } from './typed-units'

/** No figure of the trade in its kept unit is larger (guess). */
const MOST = 1e12
/** Temperatures of parts and meters in C (guess): copper's straight line holds well inside. */
const PART_C = [-100, 600] as const
const METER_C = [-100, 100] as const

/** The first field of a reading that cannot be; null when the reading can be judged. */
export function readingProblem(input: ReadingInput): FigureProblem | null {
  const { meterFunction: meter, leadsOhm, spec } = input
  const fields: Record<string, Bounded> = {
    'meterFunction.percent': [meter.percent, 0, 100],
    'meterFunction.digits': [meter.digits, 0, 1e6],
    'meterFunction.resolution': [meter.resolution, 1e-12, MOST],
    'leadsOhm.low': [leadsOhm.low, 0, 1e6],
    'leadsOhm.high': [leadsOhm.high, 0, 1e6],
    perKelvin: [input.perKelvin, 0, 100],
    ...given('partTempC', input.partTempC, PART_C),
    ...given('meterTempC', input.meterTempC, METER_C),
    ...given('spec.nominal', spec?.nominal, [-MOST, MOST]),
    ...given('spec.tolerancePercent', spec?.tolerancePercent, [0, 1e4]),
    ...given('spec.low', spec?.low, [-MOST, spec?.high ?? MOST]),
    ...given('spec.high', spec?.high, [-MOST, MOST]),
    ...given('spec.partTempC', spec?.partTempC, PART_C),
    ...eachWithin(
      'extra',
      (input.extra ?? []).map((e) => e.halfWidth),
      -MOST,
      MOST,
    ),
    ...eachWithin(
      'conditions',
      (input.conditions ?? []).map((c) => c.halfWidth),
      0,
      MOST,
    ),
    ...Object.fromEntries(
      (input.conditions ?? []).map((c, i) => [
        `conditions.${i + 1}.asked`,
        [c.asked, ...ASKED[c.kind]],
      ]),
    ),
  }
  return unfit(fields) ?? unfit({ value: [input.value, leastValue(input), MOST] })
}

/** What conditions a limit can hold for: engine and cranking speed per minute, volts, metres, minutes. */
const ASKED = {
  engineSpeed: [1, 1e5],
  crankingSpeed: [1, 1e5],
  batteryVolts: [0.1, 1e3],
  altitude: [-1000, 11_000],
  sincePriming: [0, 60],
} as const

/** A sentence about a problem, for a screen and a log. */
export function problemWords(problem: FigureProblem): string {
  const { field } = problem
  if (problem.kind === 'notANumber') return `"${field}" is not a number.`
  const side = problem.kind === 'below' ? 'under' : 'over'
  return `"${field}" cannot be ${side} ${problem.limit}.`
}

/** A meter may show a little under zero on a part of nothing, by its own error; more it cannot. */
function leastValue({ quantity, meterFunction: m, perKelvin }: ReadingInput): number {
  if (!neverNegative(quantity)) return -MOST
  return -(m.digits + 1) * m.resolution * (1 + 50 * perKelvin)
}

const given = (
  field: string,
  value: number | null | undefined,
  [least, most]: readonly [number, number],
): Record<string, Bounded> =>
  value === null || value === undefined ? {} : { [field]: [value, least, most] }
