import type { Place } from '@/lib/model/place'
import { fail, ok, type Result } from '@/lib/model/result'

/** A position fix: WGS84 degrees, accuracy in metres (the receiver's own 95 % figure), and when it was taken. */
type Fix = Pick<Place, 'latitude' | 'longitude' | 'at'> & { accuracyMetres: number }

/** Why there is no fix: the person or the phone refused, no satellite was heard, it took too long, no receiver. */
export type PositionProblem = { kind: 'refused' | 'notHeard' | 'tooSlow' | 'noReceiver' }

export type Position = { fix(): Promise<Result<Fix, PositionProblem>> }

const WAIT_MS = 25_000
/** A fix younger than this is taken as it is. */
const FRESH_MS = 10_000

/** The phone's receiver. Works without signal; the first fix under trees can take its whole time. */
export const browserPosition: Position = {
  fix: () =>
    new Promise((resolve) => {
      const receiver = globalThis.navigator?.geolocation as Geolocation | undefined
      if (receiver === undefined) {
        resolve(fail({ kind: 'noReceiver' }))
        return
      }
      receiver.getCurrentPosition(
        (found) =>
          resolve(
            ok({
              latitude: found.coords.latitude,
              longitude: found.coords.longitude,
              accuracyMetres: found.coords.accuracy,
              at: new Date(found.timestamp).toISOString(),
            }),
          ),
        (problem) => resolve(fail({ kind: problemOf(problem) })),
        { enableHighAccuracy: true, timeout: WAIT_MS, maximumAge: FRESH_MS },
      )
    }),
}

function problemOf(problem: GeolocationPositionError): PositionProblem['kind'] {
  if (problem.code === problem.PERMISSION_DENIED) return 'refused'
  return problem.code === problem.TIMEOUT ? 'tooSlow' : 'notHeard'
}
