/** Air pressure by height: US Standard Atmosphere 1976 / ISO 2533, lowest layer (to 11,000 m geopotential). */
import { fail, ok, type Result } from '@/lib/model/result'
import { type FigureProblem, unfit } from './figure-bounds'

const SEA_LEVEL_PA = 101_325
const EXPONENT = 5.255876
const EARTH_RADIUS_M = 6_356_766

const heightProblem = (geopotentialM: number): FigureProblem | null =>
  unfit({ geopotentialM: [geopotentialM, -1000, 11_000] })

/**
 * Pascals at a geopotential height in metres, -1,000 to 11,000 (US Standard Atmosphere 1976, ISO 2533). Answers the
 * height where it lies outside.
 */
export function pressureAt(geopotentialM: number): Result<number, FigureProblem> {
  const problem = heightProblem(geopotentialM)
  return problem === null ? ok(pascals(geopotentialM)) : fail(problem)
}

/**
 * Geopotential metres of a geometric height (what a map or a position fix shows), -1,000 to 100,000 m, on a sphere
 * of 6,356,766 m (US Standard Atmosphere 1976). Answers the height where it lies outside.
 */
export function geopotentialOf(geometricM: number): Result<number, FigureProblem> {
  const problem = unfit({ geometricM: [geometricM, -1000, 100_000] })
  return problem === null
    ? ok((EARTH_RADIUS_M * geometricM) / (EARTH_RADIUS_M + geometricM))
    : fail(problem)
}

/**
 * What a compression gauge reads at a geopotential height of -1,000 to 11,000 m, as a share of its reading at sea
 * level: the air's pressure there over that at 0 m. Answers the height where it lies outside.
 */
export function compressionShare(geopotentialM: number): Result<number, FigureProblem> {
  const problem = heightProblem(geopotentialM)
  return problem === null ? ok(pascals(geopotentialM) / SEA_LEVEL_PA) : fail(problem)
}

/**
 * Gauge pressure in kilopascals of a sound engine at a geopotential height in metres: p (ratio^n - 1), textbook.
 * Compression ratio 1 to 30, n the polytropic exponent, 1 to 1.67. Answers the first field that lies outside.
 */
export function compressionKpa(
  ratio: number,
  exponent: number,
  geopotentialM: number,
): Result<number, FigureProblem> {
  const problem =
    unfit({ ratio: [ratio, 1, 30], exponent: [exponent, 1, 1.67] }) ?? heightProblem(geopotentialM)
  if (problem !== null) return fail(problem)
  return ok((pascals(geopotentialM) * (ratio ** exponent - 1)) / 1000)
}

const pascals = (geopotentialM: number): number =>
  SEA_LEVEL_PA * (1 - (0.0065 * geopotentialM) / 288.15) ** EXPONENT
