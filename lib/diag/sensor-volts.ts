/**
 * Sensors on 5 V that tell by the share of their supply (ratio-metric): the share counts and not the volts, so the
 * supply is measured with the signal. A sweep of 0.5 to 4.5 V of 5 V is common practice, no source; the spec sheet
 * comes first.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type Bounded, type FigureProblem, unfit } from './figure-bounds'
import { heldAgainst } from './held-against'
import { PRACTICE_LIMITS } from './practice-limits'
import type { Verdict } from './reading'

/** Shares of the supply at the ends of the working sweep, 0 to 1, the high one above the low one. */
export type Sweep = { lowShare: number; highShare: number }
/** 0.5 to 4.5 V of 5 V (common practice, no source). */
export const COMMON_SWEEP: Sweep = { lowShare: 0.1, highShare: 0.9 }

/** Within this share of a rail the signal is open or shorted (guess). */
const AT_RAIL = 0.04

/** What a signal says: shares of the supply, and where on the sweep it stands. */
export type SensorVolts = {
  /** Signal of supply, 0 to 1 and a little over where the meter errs. */
  share: number
  /** Where in the sweep it stands, 0 to 1; under 0 or over 1 outside it. */
  position: number
  /** The supply held against 4.9 to 5.1 V: out of it, look there first. */
  supply: Verdict
  state: 'working' | 'belowSweep' | 'aboveSweep' | 'atGround' | 'atSupply'
}

/**
 * Reads a signal with its supply, both against sensor ground. Supply 1 to 30 V, signal 0 to 30 V, `supplyU` the
 * supply's expanded uncertainty, 0 to 30 V. Answers the first field that lies outside.
 */
export function sensorVolts(
  read: { signalVolts: number; supplyVolts: number; supplyU: number },
  sweep: Sweep = COMMON_SWEEP,
): Result<SensorVolts, FigureProblem> {
  const { signalVolts, supplyVolts, supplyU } = read
  const problem = unfit({
    signalVolts: [signalVolts, 0, 30],
    supplyVolts: [supplyVolts, 1, 30],
    supplyU: [supplyU, 0, 30],
    ...sweepBounds(sweep),
  })
  if (problem !== null) return fail(problem)
  const share = signalVolts / supplyVolts
  return ok({
    share,
    position: (share - sweep.lowShare) / (sweep.highShare - sweep.lowShare),
    supply: heldAgainst(supplyVolts, supplyU, PRACTICE_LIMITS.fiveVoltSupply),
    state: stateOf(share, sweep),
  })
}

/**
 * The volts that a position of the sweep (0 to 1) makes at a supply of 1 to 30 V: the way back. Answers the first
 * field that lies outside.
 */
export function signalFor(
  position: number,
  supplyVolts: number,
  sweep: Sweep = COMMON_SWEEP,
): Result<number, FigureProblem> {
  const problem = unfit({
    position: [position, 0, 1],
    supplyVolts: [supplyVolts, 1, 30],
    ...sweepBounds(sweep),
  })
  if (problem !== null) return fail(problem)
  return ok(supplyVolts * (sweep.lowShare + position * (sweep.highShare - sweep.lowShare)))
}

/** A sweep within the supply, its ends a hundredth of it apart or more. */
const sweepBounds = ({ lowShare, highShare }: Sweep): Record<string, Bounded> => ({
  lowShare: [lowShare, 0, 1],
  highShare: [highShare, lowShare + 0.01, 1],
})

/** What lies within the sweep is working, also where the sweep itself goes to a rail. */
function stateOf(share: number, { lowShare, highShare }: Sweep): SensorVolts['state'] {
  // A hair of rounding does not leave the sweep.
  if (share < lowShare - 1e-9) return share <= AT_RAIL ? 'atGround' : 'belowSweep'
  if (share <= highShare + 1e-9) return 'working'
  return share >= 1 - AT_RAIL ? 'atSupply' : 'aboveSweep'
}
