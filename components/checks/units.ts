import { QUANTITIES, type Quantity } from '@/lib/model/meter-profile'

/** A unit a figure may be typed in: value in the kept unit = typed * factor + offset. */
export type TypedUnit = { id: string; label: string; factor: number; offset: number }

const unit = (id: string, factor = 1, label = id, offset = 0): TypedUnit => ({
  id,
  label,
  factor,
  offset,
})

/** Exact factors: 1 psi = 6.894757293168 kPa and 1 inch = 25.4 mm (NIST SP 811). */
const UNITS: Record<Quantity, readonly TypedUnit[]> = {
  resistance: [unit('ohm'), unit('kohm', 1000), unit('Mohm', 1e6)],
  dcVoltage: [unit('V', 1, 'V DC'), unit('mV', 0.001, 'mV DC')],
  acVoltage: [unit('V', 1, 'V AC'), unit('mV', 0.001, 'mV AC')],
  dcCurrent: [unit('A'), unit('mA', 0.001)],
  pressure: [unit('kPa'), unit('bar', 100), unit('psi', 6.894757293168)],
  flow: [unit('L/min'), unit('mL/min', 0.001)],
  temperature: [unit('degC', 1, '°C'), unit('degF', 5 / 9, '°F', -160 / 9)],
  length: [unit('mm'), unit('in', 25.4)],
  time: [unit('s'), unit('ms', 0.001)],
}

export const unitsOf = (quantity: Quantity): readonly TypedUnit[] => UNITS[quantity]

/** The unit by its id; the kept unit when it is not one of this quantity. */
export function unitOf(quantity: Quantity, id: string | null): TypedUnit {
  const all = UNITS[quantity]
  return all.find((one) => one.id === id) ?? all[0] ?? unit(QUANTITIES[quantity])
}

/** The typed figure in the kept unit, without the last bits of binary noise. */
export const inKeptUnit = (typed: number, of: TypedUnit): number =>
  Number((typed * of.factor + of.offset).toPrecision(12))

/** Quantities that cannot be under zero: their keypad has OL where the others have the sign. */
export const neverNegative = (quantity: Quantity): boolean =>
  !['dcVoltage', 'dcCurrent', 'temperature'].includes(quantity)
