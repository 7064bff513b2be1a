/**
 * Battery state from rest volts, and what it can feed. The table is for flooded lead-acid at 26.7 C after hours of
 * rest (credited to the trade body of battery makers), linear between its rows and held at its ends; it is used
 * without a temperature correction (rule R10). Other kinds tell less or nothing by their volts and answer so.
 */
import type { Caution } from '@/lib/model/code-book'
import { fail, ok, type Result } from '@/lib/model/result'
import { EMPTY_AT_VOLTS } from './battery'
import { type FigureProblem, unfit } from './figure-bounds'

const TABLE = [
  { volts: 11.89, charge: 0, gravity: 1.12 },
  { volts: 12.06, charge: 0.25, gravity: 1.155 },
  { volts: 12.24, charge: 0.5, gravity: 1.19 },
  { volts: 12.45, charge: 0.75, gravity: 1.225 },
  { volts: 12.65, charge: 1, gravity: 1.265 },
] as const

/** Rest volts a 12 V battery can show; beyond them another thing is measured. */
const VOLTS = [0, 20] as const
const CELSIUS = [-60, 60] as const

/**
 * Share of full charge (0 to 1) and specific gravity of a flooded 12 V battery at rest, 0 to 20 V, straight between
 * the rows of the table and held beyond both ends. Answers the volts where they lie outside.
 */
export function chargeAt(
  restVolts: number,
): Result<{ charge: number; gravity: number }, FigureProblem> {
  const problem = unfit({ restVolts: [restVolts, ...VOLTS] })
  if (problem !== null) return fail(problem)
  return ok({ charge: between(restVolts, 'charge'), gravity: between(restVolts, 'gravity') })
}

/** Kinds of 12 V battery that a field bag meets. */
export const BATTERY_KINDS = ['flooded', 'agm', 'lithiumIronPhosphate'] as const
/** One of them. */
export type BatteryKind = (typeof BATTERY_KINDS)[number]

/** What rest volts say of a kind: full ones by common practice, and whether they tell the charge at all. */
export const FULL_VOLTS: Readonly<
  Record<BatteryKind, { low: number; high: number; tellsCharge: boolean }>
> = {
  flooded: { low: 12.65, high: 12.8, tellsCharge: true },
  agm: { low: 12.8, high: 12.9, tellsCharge: false },
  lithiumIronPhosphate: { low: 13.2, high: 13.4, tellsCharge: false },
}

/** `kindTellsNothing`: the rest volts of this kind do not tell its charge. */
export type BatteryProblem = FigureProblem | { kind: 'kindTellsNothing' }

/** Charge with its bounds from an uncertain reading; `kindTellsNothing` where a table for the kind is missing. */
export function chargeOf(battery: {
  restVolts: number
  expandedU: number
  kind: BatteryKind
}): Result<{ charge: number; low: number; high: number }, BatteryProblem> {
  const { restVolts, expandedU, kind } = battery
  const problem = unfit({ restVolts: [restVolts, ...VOLTS], expandedU: [expandedU, 0, 20] })
  if (problem !== null) return fail(problem)
  if (!FULL_VOLTS[kind].tellsCharge) return fail({ kind: 'kindTellsNothing' })
  const at = (volts: number): number => between(volts, 'charge')
  return ok({
    charge: at(restVolts),
    low: at(restVolts - expandedU),
    high: at(restVolts + expandedU),
  })
}

/** Charge kept back (rule R10; common practice, no source). */
const RESERVE = 0.2

/**
 * How much of its rating a battery gives in the cold, air -60 to 60 C: 1 at 25 C, 0.65 at -15 C, linear, not under
 * 0.5 (R10; practice). Answers the temperature where it lies outside.
 */
export function coldFactor(airTempC: number): Result<number, FigureProblem> {
  const problem = unfit({ airTempC: [airTempC, ...CELSIUS] })
  if (problem !== null) return fail(problem)
  return ok(Math.min(1, Math.max(0.5, 1 - ((25 - airTempC) * 0.35) / 40)))
}

/** A battery for a ride; the uncertainty is that of the volts at k = 2. Only a flooded one tells by its volts. */
export type RideBattery = {
  kind: BatteryKind
  ratedAh: number
  restVolts: number
  expandedU: number
  airTempC: number
  drawAmperes: number
}

/** Ampere-hours and minutes as read, the minutes at the low end of +-U, and whether it counts as empty. */
export type RideEnergy = {
  ampereHours: number
  minutes: number
  minutesAtLowEnd: number
  empty: boolean
}

/**
 * What a battery can feed (rule R10); nought when it counts as empty. Rated 0.1 to 500 Ah, draw 0.1 to 500 A, rest
 * volts 0 to 20, -60 to 60 C. Of a kind whose volts tell no charge nothing is reckoned: `kindTellsNothing`.
 */
export function rideEnergy(battery: RideBattery): Result<RideEnergy, BatteryProblem> {
  const { ratedAh, restVolts, expandedU, airTempC, drawAmperes } = battery
  const problem = unfit({
    ratedAh: [ratedAh, 0.1, 500],
    restVolts: [restVolts, ...VOLTS],
    expandedU: [expandedU, 0, 20],
    drawAmperes: [drawAmperes, 0.1, 500],
  })
  if (problem !== null) return fail(problem)
  const cold = coldFactor(airTempC)
  if (!cold.ok) return cold
  if (!FULL_VOLTS[battery.kind].tellsCharge) return fail({ kind: 'kindTellsNothing' })
  const hoursAt = (volts: number): number => ratedAh * usable(volts) * cold.value
  return ok({
    ampereHours: hoursAt(restVolts),
    minutes: (60 * hoursAt(restVolts)) / drawAmperes,
    minutesAtLowEnd: (60 * hoursAt(restVolts - expandedU)) / drawAmperes,
    empty: restVolts <= EMPTY_AT_VOLTS,
  })
}

/** A ride wanted asks for one and a half times its minutes (rule R10). */
const RIDE_FACTOR = 1.5

/** Whether the energy is enough for a ride of 0 to 1,440 minutes, by the low end; `shortMinutes` is 0 when it is. */
export function rideVerdict(
  battery: RideBattery,
  rideMinutes: number,
): Result<
  RideEnergy & {
    wantedMinutes: number
    shortMinutes: number
    verdict: 'enough' | 'short' | 'empty'
  },
  BatteryProblem
> {
  const problem = unfit({ rideMinutes: [rideMinutes, 0, 1440] })
  if (problem !== null) return fail(problem)
  const energy = rideEnergy(battery)
  if (!energy.ok) return energy
  const short = RIDE_FACTOR * rideMinutes - energy.value.minutesAtLowEnd
  const wantedMinutes = Math.floor(RIDE_FACTOR * rideMinutes)
  // Shown in whole minutes, never as nought while it is short at all.
  const shown = wantedMinutes - Math.floor(energy.value.minutesAtLowEnd)
  const shortMinutes = short > 0 ? Math.max(1, shown) : 0
  const verdict = energy.value.empty ? 'empty' : shortMinutes > 0 ? 'short' : 'enough'
  return ok({ ...energy.value, wantedMinutes, shortMinutes, verdict })
}

/** Under these rest volts (25 of 100 charge) the electrolyte can freeze from about -7 C (memory). */
export const FREEZES_UNDER_VOLTS = 12.06

/** The warning of a battery that can be frozen: at or below 0 C with rest volts under 12.06; null otherwise. */
export function freezeWarning(
  restVolts: number,
  airTempC: number,
): Result<Caution | null, FigureProblem> {
  const problem = unfit({ restVolts: [restVolts, ...VOLTS], airTempC: [airTempC, ...CELSIUS] })
  if (problem !== null) return fail(problem)
  if (airTempC > 0 || restVolts >= FREEZES_UNDER_VOLTS) return ok(null)
  return ok({
    signal: 'DANGER',
    text: 'A battery this low can be frozen. A swollen or iced battery can burst when it is charged or jumped: thaw it first, glasses on, no spark near it.',
  })
}

const usable = (volts: number): number =>
  volts <= EMPTY_AT_VOLTS ? 0 : Math.max(0, between(volts, 'charge') - RESERVE)

function between(volts: number, column: 'charge' | 'gravity'): number {
  const above = TABLE.findIndex((row) => row.volts >= volts)
  if (above === 0) return TABLE[0][column]
  const high = TABLE[above]
  const low = TABLE[above - 1]
  if (high === undefined || low === undefined) return TABLE[TABLE.length - 1]?.[column] ?? 0
  const share = (volts - low.volts) / (high.volts - low.volts)
  return low[column] + share * (high[column] - low[column])
}
