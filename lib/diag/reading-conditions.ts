/**
 * How well the conditions of a limit were kept, as half-widths in the budget, each on its own line (rule R7).
 * Induced volts go with speed and what a battery drives goes with its volts (physics, straight); a compression
 * gauge goes with the air's pressure (US Standard Atmosphere 1976, atmosphere.ts). Fuel pressure falls once the pump
 * has primed and stopped: by a fifth in ten minutes in a sound system at most (common practice, no source).
 */
import { compressionShare } from './atmosphere'

/** What a limit can hold for beside the temperatures of part and meter, which have lines of their own. */
export const CONDITION_KINDS = [
  'engineSpeed',
  'crankingSpeed',
  'batteryVolts',
  'altitude',
  'sincePriming',
] as const
/** One of them. */
export type ConditionKind = (typeof CONDITION_KINDS)[number]

/** What the limit asks for (per minute, per minute, volts, metres, minutes) and how far off it may have been. */
export type Condition = { kind: ConditionKind; asked: number; halfWidth: number }

/** Names of the budget's lines. */
export const CONDITION_NAMES: Record<ConditionKind, string> = {
  engineSpeed: 'Engine speed',
  crankingSpeed: 'Cranking speed',
  batteryVolts: 'Battery volts',
  altitude: 'Altitude',
  sincePriming: 'Time since priming',
}

/**
 * The half-widths that these conditions give a value, in the value's unit, from 0. What is asked lies above 0 for
 * speeds and volts; figures that cannot be are named by readingProblem before.
 */
export const conditionWidths = (
  value: number,
  conditions: readonly Condition[],
): { source: string; halfWidth: number }[] =>
  conditions.map((c) => ({
    source: CONDITION_NAMES[c.kind],
    halfWidth: Math.abs(value) * shareOf(c),
  }))

/** The share of its pressure that a sound fuel system keeps for ten minutes (common practice, no source). */
const KEPT_IN_TEN_MINUTES = 0.8

/** By what share of itself a reading may have moved. */
function shareOf({ kind, asked, halfWidth }: Condition): number {
  if (kind === 'sincePriming') return 1 - KEPT_IN_TEN_MINUTES ** (halfWidth / 10)
  if (kind !== 'altitude') return halfWidth / asked
  const at = airShare(asked)
  const ends = [airShare(asked - halfWidth), airShare(asked + halfWidth)]
  return Math.max(...ends.map((p) => Math.abs(p / at - 1)))
}

/** Heights are held within what the atmosphere's lowest layer covers. */
function airShare(metres: number): number {
  const share = compressionShare(Math.min(11_000, Math.max(-1000, metres)))
  return share.ok ? share.value : 1
}
