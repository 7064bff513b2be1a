/**
 * Battery state from rest volts: flooded lead-acid at 26.7 C after hours of rest, a table credited to the trade
 * body of battery makers, linear between its rows and held at its ends. Lithium and AGM types need other tables.
 */
const TABLE = [
  { volts: 11.89, charge: 0, gravity: 1.12 },
  { volts: 12.06, charge: 0.25, gravity: 1.155 },
  { volts: 12.24, charge: 0.5, gravity: 1.19 },
  { volts: 12.45, charge: 0.75, gravity: 1.225 },
  { volts: 12.65, charge: 1, gravity: 1.265 },
] as const

/** Share of full charge, 0 to 1, of a flooded 12 V battery at rest. */
export function chargeAt(restVolts: number): number {
  return between(restVolts, 'charge')
}

/** Specific gravity of its acid at that state. */
export const gravityAt = (restVolts: number): number => between(restVolts, 'gravity')

/** At or below these rest volts a battery counts as empty, whatever the sum says (rule R10). */
export const EMPTY_AT_VOLTS = 11.9
/** Charge kept back (rule R10; common practice, no source). */
const RESERVE = 0.2

/** How much of its rating a battery gives in the cold: 1 at 25 C, 0.65 at -15 C, linear, not under 0.5 (R10). */
export function coldFactor(airTempC: number): number {
  const factor = 1 - ((25 - airTempC) * 0.35) / 40
  return Math.min(1, Math.max(0.5, factor))
}

/** Minutes a battery can feed a draw, and the ampere-hours behind them; nought when it counts as empty. */
export function rideMinutes(battery: {
  ratedAh: number
  restVolts: number
  airTempC: number
  drawAmperes: number
}): { ampereHours: number; minutes: number } {
  const { ratedAh, restVolts, airTempC, drawAmperes } = battery
  const usable = restVolts <= EMPTY_AT_VOLTS ? 0 : Math.max(0, chargeAt(restVolts) - RESERVE)
  const ampereHours = ratedAh * usable * coldFactor(airTempC)
  return { ampereHours, minutes: drawAmperes > 0 ? (60 * ampereHours) / drawAmperes : 0 }
}

function between(volts: number, column: 'charge' | 'gravity'): number {
  if (Number.isNaN(volts)) return Number.NaN // no reading is no full battery
  const above = TABLE.findIndex((row) => row.volts >= volts)
  if (above === 0) return TABLE[0][column]
  const high = TABLE[above]
  const low = TABLE[above - 1]
  if (high === undefined || low === undefined) return TABLE[TABLE.length - 1]?.[column] ?? 0
  const share = (volts - low.volts) / (high.volts - low.volts)
  return low[column] + share * (high[column] - low[column])
}
