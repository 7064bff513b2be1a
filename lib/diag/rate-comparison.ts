/**
 * How often something fails, from counts and hours (rule R25). Choice: exact methods, because counts are small
 * and normal ones lie there: Garwood (1936) for one rate; for two, the conditional test of Przyborowski and
 * Wilenski (1940): given all events, those of the first group are binomial. The p is the central one, twice the
 * smaller tail and at most 1, so that it agrees with the interval. The price: it is cautious for few events.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import {
  binomialCdf,
  clopperPearson,
  type Interval,
  MOST_COUNTED,
  poissonInterval,
} from './exact-intervals'
import { type FigureProblem, unfit } from './figure-bounds'

/** Events counted and what they were counted over: machine-hours, starts or days, the same unit on both sides. */
export type Counted = { events: number; exposure: number }

/** No rate without hours: the screen then says "cannot say". */
export type RateProblem = FigureProblem | { kind: 'noExposure' } | { kind: 'noEvents' }

/** Least exposure; under it a rate has no meaning and the sums no digits. */
const LEAST_EXPOSURE = 1e-6

/**
 * Events per unit of exposure with Garwood's exact interval. Whole events 0 to 10,000, exposure 1e-6 to 1e12,
 * confidence 0.5 to 0.9999.
 */
export function rateOf(
  { events, exposure }: Counted,
  confidence = 0.95,
): Result<{ rate: number } & Interval, RateProblem> {
  const problem = countsProblem({ events: { events, exposure } }, confidence)
  if (problem !== null) return fail(problem)
  const counts = poissonInterval(events, confidence)
  return ok({
    rate: events / exposure,
    low: counts.low / exposure,
    high: counts.high / exposure,
  })
}

/** Two rates held against each other. */
export type RateComparison = {
  /** First rate over second; infinite when the second had no event. */
  ratio: number
  /** Exact interval of that ratio; `high` is infinite when the second had no event. */
  interval: Interval
  /** Central two-sided p of equal rates: 0 to 1. */
  p: number
}

/** Compares two rates exactly, each in the bounds of `rateOf`; `noEvents` when neither had one, `noExposure` without hours. */
export function compareRates(
  first: Counted,
  second: Counted,
  confidence = 0.95,
): Result<RateComparison, RateProblem> {
  const problem = countsProblem({ first, second }, confidence)
  if (problem !== null) return fail(problem)
  const all = first.events + second.events
  if (all === 0) return fail({ kind: 'noEvents' })
  const exposure = first.exposure + second.exposure
  const below = binomialCdf(first.events, all, first.exposure / exposure)
  // P(X >= k) as P(n - X <= n - k): a small chance keeps its digits.
  const above = binomialCdf(second.events, all, second.exposure / exposure)
  const ofAll = clopperPearson(first.events, all, confidence)
  return ok({
    ratio: (first.events / second.events / first.exposure) * second.exposure,
    interval: {
      low: (odds(ofAll.low) * second.exposure) / first.exposure,
      high: (odds(ofAll.high) * second.exposure) / first.exposure,
    },
    p: Math.min(1, 2 * Math.min(below, above)),
  })
}

/**
 * True when a p is small enough to raise an alarm on one of many parts watched: at or below 0.05 / parts, per
 * look (rule R25; Bonferroni). `partsWatched` from 1, p 0 to 1.
 */
export function raisesAlarm(p: number, partsWatched: number): Result<boolean, FigureProblem> {
  const problem = unfit({ p: [p, 0, 1], partsWatched: [partsWatched, 1, 1e6] })
  return problem === null ? ok(p <= 0.05 / partsWatched) : fail(problem)
}

const odds = (share: number): number =>
  share >= 1 ? Number.POSITIVE_INFINITY : share / (1 - share)

function countsProblem(
  groups: Readonly<Record<string, Counted>>,
  confidence: number,
): RateProblem | null {
  for (const [name, { events, exposure }] of Object.entries(groups)) {
    if (exposure === 0) return { kind: 'noExposure' }
    const problem = unfit({
      [`${name}.events`]: [events, 0, MOST_COUNTED],
      [`${name}.exposure`]: [exposure, LEAST_EXPOSURE, 1e12],
      confidence: [confidence, 0.5, 0.9999],
    })
    if (problem !== null) return problem
    if (!Number.isInteger(events)) return { kind: 'notANumber', field: `${name}.events` }
  }
  return null
}
