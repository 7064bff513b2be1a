/**
 * Copper by temperature and size: the coefficient of IEC 60028 at 20 C (also NBS Handbook 100), the
 * resistivity of 100 % IACS copper (from memory), and gauge diameters of ASTM B258.
 */

/** Temperature coefficient of copper's resistance at 20 C, per kelvin (IEC 60028). */
export const COPPER_ALPHA_20 = 0.00393
/** Resistivity of annealed copper at 20 C in ohm metres (100 % IACS, from memory). */
export const COPPER_RESISTIVITY = 1.7241e-8

/** A copper resistance measured at `fromC`, as it would read at `toC` (both in degrees Celsius, ohms). */
export function copperAt(ohm: number, fromC: number, toC: number): number {
  return (ohm * (1 + COPPER_ALPHA_20 * (toC - 20))) / (1 + COPPER_ALPHA_20 * (fromC - 20))
}

/** Diameter of a solid wire in millimetres from its American gauge number (ASTM B258). */
export const gaugeDiameterMm = (gauge: number): number => 0.127 * 92 ** ((36 - gauge) / 39)

/** Cross-section of a solid wire in square millimetres from its American gauge number. */
export const gaugeAreaMm2 = (gauge: number): number => (Math.PI * gaugeDiameterMm(gauge) ** 2) / 4

/** Resistance of solid copper in ohms at 20 C from its section and length; stranded wire is 2 to 4 % higher. */
export const wireOhm = (areaMm2: number, lengthM: number): number =>
  (COPPER_RESISTIVITY * lengthM) / (areaMm2 * 1e-6)
