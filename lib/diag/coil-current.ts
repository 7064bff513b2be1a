/** Current and energy of an ignition coil's primary by time on (dwell), for inductive coils. */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

/** The primary circuit: ohms 0.01 to 100, henries 1e-5 to 1. */
export type Primary = { ohm: number; henry: number }

const primaryBounds = ({ ohm, henry }: Primary) => ({
  ohm: [ohm, 0.01, 100] as const,
  henry: [henry, 1e-5, 1] as const,
})

/** Amperes after a dwell of 0 to 1 s at 0 to 60 V: V/R (1 - e^(-tR/L)). */
export function primaryAmperes(
  primary: Primary,
  volts: number,
  dwellS: number,
): Result<number, FigureProblem> {
  const problem = unfit({
    ...primaryBounds(primary),
    volts: [volts, 0, 60],
    dwellS: [dwellS, 0, 1],
  })
  if (problem !== null) return fail(problem)
  const { ohm, henry } = primary
  return ok((volts / ohm) * -Math.expm1((-dwellS * ohm) / henry))
}

/** Seconds to reach a current of 0 to 100 A; infinite when the volts, 0.1 to 60, cannot drive it. */
export function secondsTo(
  primary: Primary,
  volts: number,
  amperes: number,
): Result<number, FigureProblem> {
  const problem = unfit({
    ...primaryBounds(primary),
    volts: [volts, 0.1, 60],
    amperes: [amperes, 0, 100],
  })
  if (problem !== null) return fail(problem)
  const { ohm, henry } = primary
  const share = (amperes * ohm) / volts
  return ok(share >= 1 ? Number.POSITIVE_INFINITY : (-henry / ohm) * Math.log1p(-share))
}

/** Joules stored at a current of 0 to 100 A: L I^2 / 2. */
export function storedJoules(henry: number, amperes: number): Result<number, FigureProblem> {
  const problem = unfit({ henry: [henry, 1e-5, 1], amperes: [amperes, 0, 100] })
  return problem === null ? ok((henry * amperes ** 2) / 2) : fail(problem)
}
