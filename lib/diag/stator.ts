/**
 * A stator by its legs (common practice, no source): alike within 5 of 100, none to ground, and 15 to 25 V AC per
 * 1,000 rpm between two legs unplugged. A comparison under one condition says more than any limit (rule R7).
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { eachWithin, type FigureProblem, unfit } from './figure-bounds'
import { heldAgainst } from './held-against'
import { PRACTICE_LIMITS } from './practice-limits'
import type { Verdict } from './reading'

/** Legs may differ by this share: largest minus smallest, of the largest. */
export const LEG_SPREAD = 0.05

/** A leg's figure, volts or ohms, with its expanded uncertainty (k = 2). */
export type Leg = { figure: number; expandedU: number }

/** How alike the legs of a stator are. */
export type Balance = {
  /** Largest minus smallest, of the largest: 0 to 1. */
  spread: number
  verdict: 'even' | 'uneven' | 'tooClose'
  /** Place of the lowest leg in the list, from 0; null while they are even. */
  lowest: number | null
}

/** `tooFewLegs`: one has nothing to be held against. `allNought`: no leg shows anything. */
export type BalanceProblem = FigureProblem | { kind: 'tooFewLegs' } | { kind: 'allNought' }

/**
 * How alike two to twelve legs are. Figures 0 to 100,000 in one unit. Uneven only when no corner of the +-U would be
 * even. Answers the first leg that lies outside, counted from 1, `tooFewLegs` or `allNought`.
 */
export function legBalance(legs: readonly Leg[]): Result<Balance, BalanceProblem> {
  const figures = legs.map(({ figure }) => figure)
  const problem = unfit({
    ...eachWithin('leg', figures, 0, 100_000),
    ...eachWithin(
      'expandedU',
      legs.map(({ expandedU }) => expandedU),
      0,
      100_000,
    ),
  })
  if (problem !== null) return fail(problem)
  const count = unfit({ legs: [legs.length, 0, 12] })
  if (count !== null) return fail(count)
  if (legs.length < 2) return fail({ kind: 'tooFewLegs' })
  const most = Math.max(...figures)
  if (most === 0) return fail({ kind: 'allNought' })
  const lowest = figures.indexOf(Math.min(...figures))
  const spread = (most - Math.min(...figures)) / most
  const [least, widest] = spreadBounds(legs)
  const verdict = least > LEG_SPREAD ? 'uneven' : widest <= LEG_SPREAD ? 'even' : 'tooClose'
  return ok({ spread, verdict, lowest: verdict === 'even' ? null : lowest })
}

/** The least and the widest spread that the legs' uncertainties allow. */
function spreadBounds(legs: readonly Leg[]): [number, number] {
  const low = legs.map((l) => Math.max(0, l.figure - l.expandedU))
  const high = legs.map((l) => l.figure + l.expandedU)
  const top = Math.max(...low)
  const bottom = Math.min(...high)
  const least = top <= bottom || top === 0 ? 0 : (top - bottom) / top
  // Two legs make a spread: none can be its own highest and lowest.
  const apart = high.flatMap((most, i) =>
    low.flatMap((few, j) => (i === j ? [] : [(most - few) / most])),
  )
  return [least, Math.max(...apart)]
}

/** What was measured: volts per leg at an engine speed, and ohms from a leg to ground; null is over range. */
export type StatorReadings = {
  legVolts: readonly Leg[]
  engineRpm: number
  groundOhm: number | null
}

/** What the readings point to, and what they do not prove. */
export type StatorVerdict = {
  balance: Balance
  /** The mean of the sounder legs per 1,000 rpm, held against 15 to 25 V. */
  voltsPerThousand: number
  output: Verdict
  toGround: boolean
  /** What the readings speak for, likeliest first. */
  points: readonly ('windingToGround' | 'oneLeg' | 'weakOrSlow' | 'statorSound')[]
  doesNotProve: string | null
}

/** A leg that reads to ground at all is grounded; above this many ohms it is damp or the meter's own (guess). */
const GROUND_OHM = 1_000_000

/**
 * Judges a stator unplugged from its regulator. Engine speed 300 to 20,000 rpm, ground ohms from 0, null over range;
 * legs in the bounds of `legBalance`, whose problems it answers beside its own fields.
 */
export function judgeStator(readings: StatorReadings): Result<StatorVerdict, BalanceProblem> {
  const { legVolts, engineRpm, groundOhm } = readings
  const problem = unfit({
    engineRpm: [engineRpm, 300, 20_000],
    groundOhm: [groundOhm ?? 0, 0, 1e12],
  })
  if (problem !== null) return fail(problem)
  const balance = legBalance(legVolts)
  if (!balance.ok) return balance
  const { lowest, verdict } = balance.value
  const sound = verdict === 'uneven' ? legVolts.filter((_, i) => i !== lowest) : legVolts
  const mean = (of: (leg: Leg) => number): number =>
    sound.reduce((sum, leg) => sum + of(leg), 0) / sound.length / (engineRpm / 1000)
  const voltsPerThousand = mean((leg) => leg.figure)
  const output = heldAgainst(
    voltsPerThousand,
    mean((leg) => leg.expandedU),
    PRACTICE_LIMITS.statorPerThousand,
  )
  const toGround = groundOhm !== null && groundOhm < GROUND_OHM
  const points = [
    ...(toGround ? (['windingToGround'] as const) : []),
    ...(verdict === 'uneven' ? (['oneLeg'] as const) : []),
    ...(output === 'outLow' ? (['weakOrSlow'] as const) : []),
  ]
  const isSound = points.length === 0 && verdict === 'even' && output === 'in'
  return ok({
    balance: balance.value,
    voltsPerThousand,
    output,
    toGround,
    points: isSound ? ['statorSound'] : points,
    doesNotProve: verdict === 'uneven' ? PLUG_WORDS : null,
  })
}

const PLUG_WORDS =
  'A burnt plug between stator and regulator lowers one leg in the same way: look at it, and measure on the stator’s own side, before the winding is condemned.'
