/**
 * Copper by temperature and size: the coefficient of IEC 60028 at 20 C (also NBS Handbook 100), the
 * resistivity of 100 % IACS copper (from memory), and gauge diameters of ASTM B258.
 */
import { mustFit } from './figure-bounds'

/** Temperature coefficient of copper's resistance at 20 C, per kelvin (IEC 60028). */
export const COPPER_ALPHA_20 = 0.00393
/** Resistivity of annealed copper at 20 C in ohm metres (100 % IACS, from memory). */
export const COPPER_RESISTIVITY = 1.7241e-8

/**
 * A copper resistance in ohms measured at `fromC`, as it would read at `toC`. Both -200 to 600 C: the straight line
 * is meant for windings and wires, and crosses nought at -234 C. Callers have parsed their figures, else AppError.
 */
export function copperAt(ohm: number, fromC: number, toC: number): number {
  mustFit({ ohm: [ohm, 0, 1e12], fromC: [fromC, ...CELSIUS], toC: [toC, ...CELSIUS] })
  return (ohm * (1 + COPPER_ALPHA_20 * (toC - 20))) / (1 + COPPER_ALPHA_20 * (fromC - 20))
}

const CELSIUS = [-200, 600] as const

/** Diameter of a solid wire in millimetres from its American gauge number, 0 to 40 (ASTM B258). */
export const gaugeDiameterMm = (gauge: number): number => 0.127 * 92 ** ((36 - gauge) / 39)

/** Cross-section of a solid wire in square millimetres from its American gauge number, 0 to 40. */
export const gaugeAreaMm2 = (gauge: number): number => (Math.PI * gaugeDiameterMm(gauge) ** 2) / 4

/** Ohms of solid copper at 20 C from its section (above 0) and length (from 0); stranded wire is 2 to 4 % higher (seen). */
export const wireOhm = (areaMm2: number, lengthM: number): number =>
  (COPPER_RESISTIVITY * lengthM) / (areaMm2 * 1e-6)
