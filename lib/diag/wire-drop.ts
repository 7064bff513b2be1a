/**
 * Volts lost along a wire, both ways: from gauge, length and current, and which gauge a wanted loss asks for.
 * Solid copper by ASTM B258 and IEC 60028 (copper.ts); stranded wire is 2 to 4 of 100 higher (seen), the upper is taken.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { copperAt, gaugeAreaMm2, wireOhm } from './copper'
import { type FigureProblem, unfit } from './figure-bounds'

const STRANDED = 1.04
/** Gauges sold for machines, thickest first. */
export const GAUGES = [4, 6, 8, 10, 12, 14, 16, 18, 20, 22] as const

/** A wire's run: one-way metres (the current comes back the same way unless `returnsByFrame`), amperes, Celsius. */
export type Run = {
  oneWayMetres: number
  amperes: number
  celsius: number
  stranded: boolean
  returnsByFrame: boolean
}

/**
 * Ohms and volts of a run (ASTM B258, IEC 60028). Gauge 0 to 40, metres and amperes 0 to 1,000, -60 to 200 C.
 * Answers the first field that lies outside.
 */
export function wireDrop(
  gauge: number,
  run: Run,
): Result<{ ohm: number; volts: number }, FigureProblem> {
  const problem = runProblem(run) ?? unfit({ gauge: [gauge, 0, 40] })
  if (problem !== null) return fail(problem)
  const length = run.oneWayMetres * (run.returnsByFrame ? 1 : 2)
  const solid = copperAt(wireOhm(gaugeAreaMm2(gauge), length), 20, run.celsius)
  const ohm = solid * (run.stranded ? STRANDED : 1)
  return ok({ ohm, volts: ohm * run.amperes })
}

/**
 * The thinnest gauge of the list that loses no more than the volts wanted, 0 to 1,000; null when none of them does.
 * The run in the bounds of `wireDrop`; answers the first field that lies outside.
 */
export function gaugeFor(run: Run, mostVolts: number): Result<number | null, FigureProblem> {
  const problem = runProblem(run) ?? unfit({ mostVolts: [mostVolts, 0, 1000] })
  if (problem !== null) return fail(problem)
  const enough = GAUGES.filter((gauge) => {
    const drop = wireDrop(gauge, run)
    return drop.ok && drop.value.volts <= mostVolts
  })
  return ok(enough.at(-1) ?? null)
}

const runProblem = ({ oneWayMetres, amperes, celsius }: Run): FigureProblem | null =>
  unfit({
    oneWayMetres: [oneWayMetres, 0, 1000],
    amperes: [amperes, 0, 1000],
    celsius: [celsius, -60, 200],
  })
