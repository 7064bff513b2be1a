/** Resistance and temperature of sensors: NTC by beta and by Steinhart-Hart (1968), platinum by IEC 60751. */
import { fail, ok, type Result } from '@/lib/model/result'
import { crossing } from './bisection'
import { type FigureProblem, unfit } from './figure-bounds'

const KELVIN = 273.15
const OHM = [1e-3, 1e9] as const
const CELSIUS = [-100, 500] as const

const betaBounds = (r25: number, beta: number) => ({
  r25: [r25, ...OHM] as const,
  beta: [beta, 100, 20_000] as const,
})

/**
 * Ohms of an NTC at -100 to 500 C: R25 exp(B (1/T - 1/298.15)), the beta equation. R25 in ohms 1e-3 to 1e9, B in
 * kelvins 100 to 20,000. Answers the first field that lies outside.
 */
export function ntcOhm(r25: number, beta: number, celsius: number): Result<number, FigureProblem> {
  const problem = unfit({ ...betaBounds(r25, beta), celsius: [celsius, ...CELSIUS] })
  if (problem !== null) return fail(problem)
  return ok(r25 * Math.exp(beta * (1 / (celsius + KELVIN) - 1 / 298.15)))
}

/** `noTemperature`: no temperature gives these ohms on this curve. */
export type CurveProblem = FigureProblem | { kind: 'noTemperature' }

/**
 * Degrees Celsius of an NTC from its ohms, 1e-3 to 1e9, by the beta equation; R25 and B as in `ntcOhm`. Answers the
 * first field that lies outside, or `noTemperature`.
 */
export function ntcCelsius(r25: number, beta: number, ohm: number): Result<number, CurveProblem> {
  const problem = unfit({ ...betaBounds(r25, beta), ohm: [ohm, ...OHM] })
  return problem === null ? celsiusOf(1 / 298.15 + Math.log(ohm / r25) / beta) : fail(problem)
}

/** Coefficients of 1/T = A + B ln R + C (ln R)^3, T in kelvins and R in ohms. */
export type SteinhartHart = { a: number; b: number; c: number }

/**
 * Degrees Celsius from ohms, 1e-3 to 1e9: 1/T = A + B ln R + C (ln R)^3 (Steinhart and Hart 1968). Coefficients -1
 * to 1. Answers the first field that lies outside, or `noTemperature`.
 */
export function steinhartCelsius(
  { a, b, c }: SteinhartHart,
  ohm: number,
): Result<number, CurveProblem> {
  const problem = unfit({ a: [a, -1, 1], b: [b, -1, 1], c: [c, -1, 1], ohm: [ohm, ...OHM] })
  if (problem !== null) return fail(problem)
  const log = Math.log(ohm)
  return celsiusOf(a + b * log + c * log ** 3)
}

/** One row of a sensor's table: ohms and degrees Celsius. */
export type CurvePoint = readonly [ohm: number, celsius: number]

/**
 * The coefficients through three points, solved from the linear equations. `sameTwice` when two have the same ohms,
 * `noCurve` when the logarithms of the three sum to 0, where no one curve goes through them. Ohms 1e-3 to 1e9, -100
 * to 500 C.
 */
export function fitSteinhart(
  points: readonly [CurvePoint, CurvePoint, CurvePoint],
): Result<SteinhartHart, FigureProblem | { kind: 'sameTwice' } | { kind: 'noCurve' }> {
  const problem = unfit(
    Object.fromEntries(
      points.flatMap(([ohm, celsius], i) => [
        [`ohm.${i + 1}`, [ohm, ...OHM] as const],
        [`celsius.${i + 1}`, [celsius, ...CELSIUS] as const],
      ]),
    ),
  )
  if (problem !== null) return fail(problem)
  const [[o1, t1], [o2, t2], [o3, t3]] = points
  const [l1, l2, l3] = [Math.log(o1), Math.log(o2), Math.log(o3)]
  if (l1 === l2 || l1 === l3 || l2 === l3) return fail({ kind: 'sameTwice' })
  if (Math.abs(l1 + l2 + l3) < 1e-9) return fail({ kind: 'noCurve' })
  const [y1, y2, y3] = [1 / (t1 + KELVIN), 1 / (t2 + KELVIN), 1 / (t3 + KELVIN)]
  const g2 = (y2 - y1) / (l2 - l1)
  const g3 = (y3 - y1) / (l3 - l1)
  const c = (g3 - g2) / (l3 - l2) / (l1 + l2 + l3)
  const b = g2 - c * (l1 ** 2 + l1 * l2 + l2 ** 2)
  return ok({ a: y1 - (b + l1 ** 2 * c) * l1, b, c })
}

/** Ohms of a Pt100 at -200 to 850 C (IEC 60751). Answers the temperature where it lies outside. */
export function pt100Ohm(celsius: number): Result<number, FigureProblem> {
  const problem = unfit({ celsius: [celsius, -200, 850] })
  return problem === null ? ok(platinum(celsius)) : fail(problem)
}

/**
 * Degrees Celsius of a Pt100 from its ohms, those of -200 to 850 C (IEC 60751): the way back, by halving. Answers
 * the ohms where they lie outside.
 */
export function pt100Celsius(ohm: number): Result<number, FigureProblem> {
  const problem = unfit({ ohm: [ohm, platinum(-200), platinum(850)] })
  return problem === null ? ok(crossing((t) => platinum(t) - ohm, -200, 850)) : fail(problem)
}

function platinum(celsius: number): number {
  const cold = celsius < 0 ? -4.183e-12 * (celsius - 100) * celsius ** 3 : 0
  return 100 * (1 + 3.9083e-3 * celsius - 5.775e-7 * celsius ** 2 + cold)
}

function celsiusOf(perKelvin: number): Result<number, CurveProblem> {
  return perKelvin > 0 && Number.isFinite(perKelvin)
    ? ok(1 / perKelvin - KELVIN)
    : fail({ kind: 'noTemperature' })
}
