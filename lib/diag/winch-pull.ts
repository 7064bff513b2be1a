/**
 * Pull to move a machine that is stuck or towed: weight times slope and ground (rules [B1], [B2] of
 * docs/spec/diag.md). Ground factors are those of a recovery sheet (seen); the field rule for the slope is the army
 * recovery manual's (memory). All are rough: the margin stands for that. The maker's manual and the winch's own
 * plate come first.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

/** Standard gravity in metres per second squared (ISO 80000-3). */
const GRAVITY = 9.80665

/** Share of the weight that the ground holds back, by what it is (recovery sheet, seen). */
export const GROUNDS = {
  hard: 0.04,
  dryGrass: 0.14,
  hardWetSand: 0.17,
  softWetSand: 0.2,
  gravelOrDrySand: 0.25,
  lightMud: 0.33,
  mudToRim: 0.75,
  wheelDepth: 1.0,
  bodyDepth: 1.33,
} as const
/** One of them. */
export type Ground = keyof typeof GROUNDS

/** Weight added when wheels or tracks do not turn: up to half of them, or more (recovery sheet, seen). */
export const LOCKED = { none: 0, upToHalf: 0.33, moreThanHalf: 0.67 } as const
/** One of them. */
export type Locked = keyof typeof LOCKED

/** Added to the pull before anything is rated against it: 20 to 25 of 100 is common practice; the upper one is ours. */
export const PULL_MARGIN = 0.25

/** What is to be moved: mass with its load, slope against the pull (downhill negative), and what holds it. */
export type Stuck = { massKg: number; slopeDegrees: number; ground: Ground; locked: Locked }

/** Newtons, and what they are made of. */
export type Pull = {
  /** W sin a; negative downhill. */
  gravityNewtons: number
  /** W c cos a. */
  groundNewtons: number
  /** W times 0.33 or 0.67. */
  lockedNewtons: number
  /** The sum, not under 0: what the line must pull. */
  pullNewtons: number
  withMarginNewtons: number
  /** The field rule beside it: angle / 60 of the weight up to 45 degrees, ground in full; null above 45. */
  fieldRuleNewtons: number | null
}

/**
 * The pull of a stuck machine in newtons: W (sin a + c cos a), textbook. Mass 1 to 20,000 kg, slope -60 to 60
 * degrees, margin 0 to 2. Answers the first field that lies outside.
 */
export function pullOf(stuck: Stuck, margin = PULL_MARGIN): Result<Pull, FigureProblem> {
  const { massKg, slopeDegrees, ground, locked } = stuck
  const problem = unfit({
    massKg: [massKg, 1, 20_000],
    slopeDegrees: [slopeDegrees, -60, 60],
    margin: [margin, 0, 2],
  })
  if (problem !== null) return fail(problem)
  const weight = massKg * GRAVITY
  const angle = (slopeDegrees * Math.PI) / 180
  const gravityNewtons = weight * Math.sin(angle)
  const groundNewtons = weight * GROUNDS[ground] * Math.cos(angle)
  const lockedNewtons = weight * LOCKED[locked]
  const pullNewtons = Math.max(0, gravityNewtons + groundNewtons + lockedNewtons)
  return ok({
    gravityNewtons,
    groundNewtons,
    lockedNewtons,
    pullNewtons,
    withMarginNewtons: (1 + margin) * pullNewtons,
    fieldRuleNewtons: fieldRule(weight, slopeDegrees, GROUNDS[ground] + LOCKED[locked]),
  })
}

function fieldRule(weight: number, slopeDegrees: number, factor: number): number | null {
  if (Math.abs(slopeDegrees) > 45) return null
  return Math.max(0, weight * (slopeDegrees / 60 + factor))
}

/** A tow: the pull to keep it moving, and what must hold it back downhill. */
export type Tow = {
  pullNewtons: number
  /** What line or bar are rated against: the pull, or what must be held back where that is more, with the margin. */
  withMarginNewtons: number
  /** What the brakes of the tower must hold on this slope when the towed machine cannot brake; 0 on the flat. */
  holdBackNewtons: number
  /** True when it would run into the tower: then a rigid bar, or a second line behind, and no rope (rule R10). */
  needsRigidBar: boolean
}

/**
 * The tow of a machine of 1 to 20,000 kg with its wheels or track free, on the flat (slope 0), up (positive) or down
 * a slope of at most 45 degrees, at a steady speed. `brakesWork` is the towed machine's own brakes with somebody on it to use them.
 */
export function towOf(
  towed: Omit<Stuck, 'locked'> & { brakesWork: boolean },
  margin = PULL_MARGIN,
): Result<Tow, FigureProblem> {
  const { massKg, slopeDegrees, ground, brakesWork } = towed
  const steep = unfit({ slopeDegrees: [slopeDegrees, -45, 45] })
  if (steep !== null) return fail(steep)
  const pull = pullOf({ massKg, slopeDegrees, ground, locked: 'none' }, margin)
  if (!pull.ok) return pull
  const { gravityNewtons, groundNewtons, pullNewtons } = pull.value
  const holdBackNewtons = brakesWork ? 0 : Math.max(0, -gravityNewtons - groundNewtons)
  return ok({
    pullNewtons,
    withMarginNewtons: (1 + margin) * Math.max(pullNewtons, holdBackNewtons),
    holdBackNewtons,
    needsRigidBar: !brakesWork && slopeDegrees < 0,
  })
}
