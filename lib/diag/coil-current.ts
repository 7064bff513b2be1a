/**
 * Current and energy of an ignition coil's primary by time on (dwell), for inductive coils: a resistance and an
 * inductance in series at steady volts (textbook); the core's saturation is left out.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type Bounded, type FigureProblem, unfit } from './figure-bounds'

/** The primary circuit: ohms 0.01 to 100, henries 1e-5 to 1. */
export type Primary = { ohm: number; henry: number }

const OHM = [0.01, 100] as const
const HENRY = [1e-5, 1] as const
const AMPERES = [0, 100] as const

/**
 * Amperes after a dwell in seconds, 0 to 1, at 0.1 to 60 V: V/R (1 - e^(-tR/L)), the textbook's circuit of one
 * resistance and one inductance. Answers the first field that lies outside.
 */
export function primaryAmperes(
  primary: Primary,
  volts: number,
  dwellS: number,
): Result<number, FigureProblem> {
  return charging(
    primary,
    volts,
    { dwellS: [dwellS, 0, 1] },
    ({ final, seconds }) => final * -Math.expm1(-dwellS / seconds),
  )
}

/**
 * Seconds to reach a current of 0 to 100 A at 0.1 to 60 V, by the same law turned round; infinite when the volts
 * cannot drive it. Answers the first field that lies outside.
 */
export function secondsTo(
  primary: Primary,
  volts: number,
  amperes: number,
): Result<number, FigureProblem> {
  return charging(primary, volts, { amperes: [amperes, ...AMPERES] }, ({ final, seconds }) =>
    amperes >= final ? Number.POSITIVE_INFINITY : -seconds * Math.log1p(-amperes / final),
  )
}

/** The current that a primary tends to at these volts, and its time constant L/R, once the figures fit. */
function charging(
  { ohm, henry }: Primary,
  volts: number,
  asked: Record<string, Bounded>,
  answer: (circuit: { final: number; seconds: number }) => number,
): Result<number, FigureProblem> {
  const problem = unfit({
    ohm: [ohm, ...OHM],
    henry: [henry, ...HENRY],
    volts: [volts, 0.1, 60],
    ...asked,
  })
  return problem === null ? ok(answer({ final: volts / ohm, seconds: henry / ohm })) : fail(problem)
}

/**
 * Joules stored at 1e-5 to 1 H and a current of 0 to 100 A: L I^2 / 2 (textbook). Answers the first field that lies
 * outside.
 */
export function storedJoules(henry: number, amperes: number): Result<number, FigureProblem> {
  const problem = unfit({ henry: [henry, ...HENRY], amperes: [amperes, ...AMPERES] })
  return problem === null ? ok((henry * amperes ** 2) / 2) : fail(problem)
}
