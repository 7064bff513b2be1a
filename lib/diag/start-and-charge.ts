/**
 * Volts while cranking and while charging (common practice, no source): both limits hold for a temperature or a
 * speed, and where that is not kept the answer says so instead of a verdict. Rule [A4].
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'
import { heldAgainst } from './held-against'

/**
 * Least cranking volts at an air temperature of -60 to 60 C: 9.6 V at 21 C over 15 s, 9.1 V at -10 C, straight
 * between; held beyond both (common practice, no source). Answers the temperature where it lies outside.
 */
export function crankingLimit(airTempC: number): Result<number, FigureProblem> {
  const problem = unfit({ airTempC: [airTempC, -60, 60] })
  if (problem !== null) return fail(problem)
  const share = Math.min(1, Math.max(0, (airTempC + 10) / 31))
  return ok(9.1 + 0.5 * share)
}

/** A reading in volts with its expanded uncertainty (k = 2; 0 where none is known). */
export type VoltsRead = { volts: number; expandedU: number }

/** `outside`: colder than -10 C, where practice gives no figure and the last one is held. */
export type CrankingVerdict = {
  limitVolts: number
  verdict: 'holds' | 'low' | 'tooClose'
  outside: boolean
}

/**
 * Whether a battery holds while it cranks. Volts and their expanded uncertainty 0 to 20, air -60 to 60 C. Answers
 * the first field that lies outside.
 */
export function judgeCranking(
  read: VoltsRead,
  airTempC: number,
): Result<CrankingVerdict, FigureProblem> {
  const limit = crankingLimit(airTempC)
  if (!limit.ok) return limit
  const problem = readProblem(read)
  if (problem !== null) return fail(problem)
  const held = heldAgainst(read.volts, read.expandedU, { low: limit.value, high: null })
  const verdict = held === 'in' ? 'holds' : held === 'outLow' ? 'low' : 'tooClose'
  return ok({ limitVolts: limit.value, verdict, outside: airTempC < -10 })
}

/** From this engine speed on a sound machine charges. */
export const CHARGING_RPM = 3000

/** Whether a machine charges; `tooSlow` where the condition of the limit was not kept. */
export type ChargingVerdict = {
  /**
   * `notCharging` under 13.0 V; `weak` to 13.5; `charging` to 14.8; `high` to 15.0; `regulator` above;
   * `tooClose` across one of these; `tooSlow` when the speed was too low for a low reading to mean anything.
   */
  verdict: 'notCharging' | 'weak' | 'charging' | 'high' | 'regulator' | 'tooClose' | 'tooSlow'
  /** True for `high` below 0 C: regulators that know the cold charge higher (common practice, no source). */
  coldExplains: boolean
}

/**
 * Whether a running machine charges its battery. Volts and their expanded uncertainty 0 to 20, engine speed 0 to
 * 20,000 rpm, -60 to 60 C. Answers the first field that lies outside.
 */
export function judgeCharging(
  read: VoltsRead,
  at: { engineRpm: number; airTempC: number },
): Result<ChargingVerdict, FigureProblem> {
  const problem =
    readProblem(read) ??
    unfit({ engineRpm: [at.engineRpm, 0, 20_000], airTempC: [at.airTempC, -60, 60] })
  if (problem !== null) return fail(problem)
  const zone = ZONES.find(
    ({ low, high }) => heldAgainst(read.volts, read.expandedU, { low, high }) === 'in',
  )
  const verdict = zone?.verdict ?? 'tooClose'
  // Too close between good and high is no low reading: it stands at any speed.
  const low =
    verdict === 'notCharging' ||
    verdict === 'weak' ||
    (verdict === 'tooClose' && read.volts - read.expandedU < CHARGING_FROM)
  if (low && at.engineRpm < CHARGING_RPM) return ok({ verdict: 'tooSlow', coldExplains: false })
  return ok({ verdict, coldExplains: verdict === 'high' && at.airTempC < 0 })
}

/** Volts from which on a machine charges. */
const CHARGING_FROM = 13.5
/** At a shared edge the sounder zone comes first; `notCharging` and `regulator` begin strictly past theirs. */
const ZONES = [
  { verdict: 'charging', low: CHARGING_FROM, high: 14.8 },
  { verdict: 'weak', low: 13.0, high: CHARGING_FROM },
  { verdict: 'high', low: 14.8, high: 15.0 },
  { verdict: 'notCharging', low: null, high: 13.0 },
  { verdict: 'regulator', low: 15.0, high: null },
] as const

const readProblem = ({ volts, expandedU }: VoltsRead): FigureProblem | null =>
  unfit({ volts: [volts, 0, 20], expandedU: [expandedU, 0, 20] })
