/** Air pressure by height: US Standard Atmosphere 1976 / ISO 2533, lowest layer (to 11,000 m geopotential). */
const SEA_LEVEL_PA = 101_325
const EXPONENT = 5.255876
const EARTH_RADIUS_M = 6_356_766

/** Pascals at a geopotential height in metres, -1,000 to 11,000. */
export const pressureAt = (geopotentialM: number): number =>
  SEA_LEVEL_PA * (1 - (0.0065 * geopotentialM) / 288.15) ** EXPONENT

/** Geopotential metres of a geometric height (what a map or a position fix shows). */
export const geopotentialOf = (geometricM: number): number =>
  (EARTH_RADIUS_M * geometricM) / (EARTH_RADIUS_M + geometricM)

/** What a compression gauge reads at this geopotential height, as a share of its reading at sea level. */
export const compressionShare = (geopotentialM: number): number =>
  pressureAt(geopotentialM) / SEA_LEVEL_PA

/** Gauge pressure in kilopascals of a sound engine there: p (ratio^n - 1), n the polytropic exponent. */
export const compressionKpa = (ratio: number, exponent: number, geopotentialM: number): number =>
  (pressureAt(geopotentialM) * (ratio ** exponent - 1)) / 1000
