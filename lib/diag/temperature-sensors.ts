/** Resistance and temperature of sensors: NTC by beta and by Steinhart-Hart (1968), platinum by IEC 60751. */
const KELVIN = 273.15

/** Ohms of an NTC at a temperature: R25 exp(B (1/T - 1/298.15)), temperature in degrees Celsius. */
export const ntcOhm = (r25: number, beta: number, celsius: number): number =>
  r25 * Math.exp(beta * (1 / (celsius + KELVIN) - 1 / 298.15))

/** Degrees Celsius of an NTC from its ohms by the beta equation. */
export const ntcCelsius = (r25: number, beta: number, ohm: number): number =>
  1 / (1 / 298.15 + Math.log(ohm / r25) / beta) - KELVIN

export type SteinhartHart = { a: number; b: number; c: number }

/** Degrees Celsius from ohms: 1/T = A + B ln R + C (ln R)^3. */
export function steinhartCelsius({ a, b, c }: SteinhartHart, ohm: number): number {
  const log = Math.log(ohm)
  return 1 / (a + b * log + c * log ** 3) - KELVIN
}

/** The coefficients through three points (ohms, degrees Celsius), solved from the linear equations. */
export function fitSteinhart(
  points: readonly [
    readonly [number, number],
    readonly [number, number],
    readonly [number, number],
  ],
): SteinhartHart {
  const [l1, l2, l3] = points.map(([ohm]) => Math.log(ohm)) as [number, number, number]
  const [y1, y2, y3] = points.map(([, celsius]) => 1 / (celsius + KELVIN)) as [
    number,
    number,
    number,
  ]
  const g2 = (y2 - y1) / (l2 - l1)
  const g3 = (y3 - y1) / (l3 - l1)
  const c = (g3 - g2) / (l3 - l2) / (l1 + l2 + l3)
  const b = g2 - c * (l1 ** 2 + l1 * l2 + l2 ** 2)
  return { a: y1 - (b + l1 ** 2 * c) * l1, b, c }
}

/** Ohms of a Pt100 at -200 to 850 degrees Celsius (IEC 60751). */
export function pt100Ohm(celsius: number): number {
  const cold = celsius < 0 ? -4.183e-12 * (celsius - 100) * celsius ** 3 : 0
  return 100 * (1 + 3.9083e-3 * celsius - 5.775e-7 * celsius ** 2 + cold)
}
