/**
 * Compression and leak-down (common practice, no source, unless said). The spread between cylinders says more than
 * any figure, since height, cranking speed and a starting decompressor move all alike; the figure against a spec
 * is corrected for height first (atmosphere.ts).
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { compressionShare } from './atmosphere'
import { eachWithin, type FigureProblem, unfit } from './figure-bounds'

/** Cylinders may differ by this share of the best: sound up to the first, not above the second. */
export const CYLINDER_SPREAD = { sound: 0.1, most: 0.15 } as const

/** How alike the cylinders are: `spread` best minus weakest, of the best. */
export type CompressionSpread = {
  /** Best minus worst, of the best: 0 to 1. */
  spread: number
  verdict: 'even' | 'doubtful' | 'uneven'
  /** The weakest cylinder, from 1. */
  weakest: number
}

/** `tooFewCylinders`: one alone has nothing to be held against. */
export type CompressionProblem = FigureProblem | { kind: 'tooFewCylinders' }

/**
 * How alike two or more cylinders are, gauge readings in any one unit above 0, to 100,000 (spread: common practice,
 * no source). Answers the first cylinder that lies outside, counted from 1, or `tooFewCylinders`.
 */
export function compressionSpread(
  gauge: readonly number[],
): Result<CompressionSpread, CompressionProblem> {
  const problem = unfit(eachWithin('cylinder', gauge, 0.001, 100_000))
  if (problem !== null) return fail(problem)
  if (gauge.length < 2) return fail({ kind: 'tooFewCylinders' })
  const [best, worst] = [Math.max(...gauge), Math.min(...gauge)]
  const spread = (best - worst) / best
  const verdict =
    spread <= CYLINDER_SPREAD.sound
      ? 'even'
      : spread <= CYLINDER_SPREAD.most
        ? 'doubtful'
        : 'uneven'
  return ok({ spread, verdict, weakest: gauge.indexOf(worst) + 1 })
}

/**
 * A gauge reading (any one unit, 0 to 100,000) taken at a height of -1,000 to 11,000 geopotential metres, as it
 * would read at sea level (US Standard Atmosphere 1976). Answers the first field that lies outside.
 */
export function atSeaLevel(gauge: number, heightM: number): Result<number, FigureProblem> {
  const problem = unfit({ gauge: [gauge, 0, 100_000] })
  if (problem !== null) return fail(problem)
  const share = compressionShare(heightM)
  return share.ok ? ok(gauge / share.value) : share
}

/** With a starting decompressor the figure is 40 to 80 psi low, so that only the spread counts. */
export const DECOMPRESSOR_PSI = { least: 40, most: 80 } as const

/** A rise from here on speaks for rings, up to the first for valves or head gasket; between, for neither. */
export const WET_RISE = { none: 0.1, rings: 0.15 } as const

/**
 * The wet test: the rise after a little oil, as a share of the dry figure, and what it speaks for (common practice,
 * no source). Both in one unit, dry above 0, to 100,000. Answers the first field that lies outside.
 */
export function wetTest(
  dry: number,
  wet: number,
): Result<{ rise: number; pointsTo: 'rings' | 'valvesOrGasket' | 'cannotTell' }, FigureProblem> {
  const problem = unfit({ dry: [dry, 0.001, 100_000], wet: [wet, 0, 100_000] })
  if (problem !== null) return fail(problem)
  const rise = (wet - dry) / dry
  const pointsTo =
    rise >= WET_RISE.rings ? 'rings' : rise < WET_RISE.none ? 'valvesOrGasket' : 'cannotTell'
  return ok({ rise, pointsTo })
}

/**
 * Leak-down by two gauges and an orifice, both in one unit: supply 1 to 100,000, kept 0 to the supply. The share
 * lost (0 to 1): under 10 of 100 good, to 20 worn, to 30 poor, above it must be mended; `failsAviation` where less
 * than 60 of 80 is kept (figures from memory of aviation practice). Answers the first field that lies outside.
 */
export function leakDown(
  supply: number,
  kept: number,
): Result<
  { leak: number; verdict: 'good' | 'worn' | 'poor' | 'mend'; failsAviation: boolean },
  FigureProblem
> {
  const problem = unfit({ supply: [supply, 1, 100_000], kept: [kept, 0, supply] })
  if (problem !== null) return fail(problem)
  const leak = (supply - kept) / supply
  const verdict = leak < 0.1 ? 'good' : leak <= 0.2 ? 'worn' : leak <= 0.3 ? 'poor' : 'mend'
  return ok({ leak, verdict, failsAviation: kept / supply < 60 / 80 })
}
