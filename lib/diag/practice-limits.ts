/**
 * Generic limits of the trade, for when neither maker nor shop has a figure: common practice, no source, and said
 * so wherever one is shown. The spec sheet always comes first (rule R18). Rule [A4].
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'
import { heldAgainst } from './held-against'
import type { Verdict } from './reading'

type Limit = { low: number | null; high: number | null; unit: string; words: string }

/** What stands as the source of each of these limits. */
export const PRACTICE_SOURCE = 'common practice, no source'

/** Each with its unit and the condition it is meant for. */
export const PRACTICE_LIMITS = {
  groundDrop: { low: null, high: 0.1, unit: 'V', words: 'ground side or connection, under load' },
  contactDrop: { low: null, high: 0.2, unit: 'V', words: 'switch or relay contact, under load' },
  lightingDrop: { low: null, high: 0.3, unit: 'V', words: 'whole lighting feed, lights on' },
  starterDrop: {
    low: null,
    high: 0.5,
    unit: 'V',
    words: 'one whole side of the starter, cranking',
  },
  sensorGroundDrop: { low: null, high: 0.05, unit: 'V', words: 'sensor ground to battery minus' },
  fiveVoltSupply: { low: 4.9, high: 5.1, unit: 'V', words: 'between supply and sensor ground' },
  coilPrimary: { low: 0.2, high: 5, unit: 'ohm', words: 'coil primary, unplugged' },
  coilSecondary: { low: 3000, high: 20_000, unit: 'ohm', words: 'coil secondary, cap off' },
  plugCap: { low: 5000, high: 10_000, unit: 'ohm', words: 'plug cap alone' },
  capacitorIgnition: { low: 100, high: 400, unit: 'V', words: 'primary peak while cranking' },
  pickupPeak: { low: 0.5, high: 10, unit: 'V', words: 'trigger coil peak while cranking' },
  statorLeg: { low: 0.1, high: 1, unit: 'ohm', words: 'between two legs, unplugged' },
  statorPerThousand: {
    low: 15,
    high: 25,
    unit: 'V',
    words: 'AC per 1,000 rpm, two legs, unplugged',
  },
  fuelRail: { low: 250, high: 400, unit: 'kPa', words: 'injection rail, pump running' },
  pulsePump: { low: 10, high: 30, unit: 'kPa', words: 'carburettor fed by a pulse pump' },
  fuelFlow: { low: 0.5, high: null, unit: 'L/min', words: 'into a jar, pump running' },
  drainSmall: { low: null, high: 5, unit: 'mA', words: 'key off, small machine, after it slept' },
  drainCar: { low: null, high: 50, unit: 'mA', words: 'key off, car, after it slept' },
} as const satisfies Record<string, Limit>
/** One of the limits. */
export type PracticeLimit = keyof typeof PRACTICE_LIMITS

/**
 * A figure in the limit's unit, within +-1e6, held against it, with its expanded uncertainty from 0 to 1e6 (k = 2; 0
 * where none is known): the verdict of ISO 14253-1. Answers the first field that lies outside.
 */
export function judgePractice(
  name: PracticeLimit,
  figure: number,
  expandedU = 0,
): Result<Verdict, FigureProblem> {
  const problem = unfit({ figure: [figure, -1e6, 1e6], expandedU: [expandedU, 0, 1e6] })
  return problem === null
    ? ok(heldAgainst(figure, expandedU, PRACTICE_LIMITS[name]))
    : fail(problem)
}

/**
 * Resistance behind a drop, in milliohms (Ohm's law): 0.2 V at 10 A are 20. Volts 0 to 1,000, amperes 0.001 to
 * 10,000. Answers the first field that lies outside.
 */
export function milliohmsOf(dropVolts: number, amperes: number): Result<number, FigureProblem> {
  const problem = unfit({ dropVolts: [dropVolts, 0, 1000], amperes: [amperes, 0.001, 10_000] })
  return problem === null ? ok((1000 * dropVolts) / amperes) : fail(problem)
}

/**
 * Peak of a sine from what an AC meter shows: sqrt(2) times (textbook). Volts 0 to 100,000. Answers the volts where
 * they lie outside.
 */
export function sinePeak(rmsVolts: number): Result<number, FigureProblem> {
  const problem = unfit({ rmsVolts: [rmsVolts, 0, 100_000] })
  return problem === null ? ok(Math.SQRT2 * rmsVolts) : fail(problem)
}

/**
 * Litres a minute from what ran into a jar: 0.125 L in 15 s are 0.5. Litres 0 to 100, seconds 1 to 3,600. Answers
 * the first field that lies outside.
 */
export function flowPerMinute(litres: number, seconds: number): Result<number, FigureProblem> {
  const problem = unfit({ litres: [litres, 0, 100], seconds: [seconds, 1, 3600] })
  return problem === null ? ok((60 * litres) / seconds) : fail(problem)
}

/**
 * Share of fuel pressure lost (0 to 1), and whether it held: under 20 of 100 in 10 minutes (common practice, no
 * source); null where the wait was too short or too long to say. Start 1 to 10,000 kPa, after 0 to the start,
 * minutes 0 to 1,440. Answers the first field that lies outside.
 */
export function pressureHold(
  startKpa: number,
  afterKpa: number,
  minutes: number,
): Result<{ lost: number; held: boolean | null }, FigureProblem> {
  const problem = unfit({
    startKpa: [startKpa, 1, 10_000],
    afterKpa: [afterKpa, 0, startKpa],
    minutes: [minutes, 0, 1440],
  })
  if (problem !== null) return fail(problem)
  const lost = (startKpa - afterKpa) / startKpa
  if (lost >= 0.2) return ok({ lost, held: minutes <= 10 ? false : null })
  return ok({ lost, held: minutes >= 10 ? true : null })
}
