import { QUANTITIES, type Quantity } from '@/lib/model/meter-profile'

/** A unit a figure may be typed in: value in the quantity's kept unit = typed * factor + offset. */
export type TypedUnit = { id: string; factor: number; offset: number }

const unit = (id: string, factor = 1, offset = 0): TypedUnit => ({ id, factor, offset })

/** Exact factors: 1 psi = 6.894757293168 kPa and 1 inch = 25.4 mm (NIST SP 811); decimal multiples of the SI. */
const UNITS: Record<Quantity, readonly TypedUnit[]> = {
  resistance: [unit('ohm'), unit('kohm', 1000), unit('Mohm', 1e6)],
  dcVoltage: [unit('V'), unit('mV', 0.001)],
  acVoltage: [unit('V'), unit('mV', 0.001)],
  dcCurrent: [unit('A'), unit('mA', 0.001)],
  pressure: [unit('kPa'), unit('bar', 100), unit('psi', 6.894757293168)],
  flow: [unit('L/min'), unit('mL/min', 0.001)],
  temperature: [unit('degC'), unit('degF', 5 / 9, -160 / 9)],
  length: [unit('mm'), unit('in', 25.4)],
  time: [unit('s'), unit('ms', 0.001)],
}

/** The units a quantity may be typed in, the kept one first. */
export const unitsOf = (quantity: Quantity): readonly TypedUnit[] => UNITS[quantity]

/** The unit by its id; the kept unit when it is not one of this quantity. */
export function unitOf(quantity: Quantity, id: string | null): TypedUnit {
  const all = UNITS[quantity]
  return all.find((one) => one.id === id) ?? all[0] ?? unit(QUANTITIES[quantity])
}

/** The typed figure in the kept unit, without the last bits of binary noise. */
export const inKeptUnit = (typed: number, of: TypedUnit): number =>
  Number((typed * of.factor + of.offset).toPrecision(12))

/** True for quantities that cannot be under zero; volts, direct current and temperatures can. */
export const neverNegative = (quantity: Quantity): boolean =>
  !['dcVoltage', 'dcCurrent', 'temperature'].includes(quantity)
