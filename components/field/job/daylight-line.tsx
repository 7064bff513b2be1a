'use client'

import { sunTimes } from '@/lib/diag/daylight'
import type { Place } from '@/lib/model/place'
import { clockTime, span } from '../times'
import { useNow } from '../use-now'

/** Sunset and civil dusk at the job's place today, and how long that is off. */
export function DaylightLine({ place, zone }: { place: Place; zone: string }) {
  const now = useNow()
  const sun = sunTimes(place.latitude, place.longitude, now)
  const at = (ms: number) => clockTime(new Date(ms).toISOString(), zone)
  if (sun.civilDusk === null) {
    return (
      <p>
        {sun.never === 'rises'
          ? 'The sun does not rise here today.'
          : 'It does not get dark here today.'}
      </p>
    )
  }
  const left = sun.civilDusk - now
  const dawn = sun.civilDawn !== null && now < sun.civilDawn ? sun.civilDawn : null
  return (
    <p>
      {sun.sunset === null ? '' : `Sunset ${at(sun.sunset)}. `}
      Dark from <b className="figures">{at(sun.civilDusk)}</b> (civil dusk)
      {dawn === null
        ? left > 0
          ? `, ${span(left)} from now.`
          : ': it is dark.'
        : `, light from ${at(dawn)}.`}
    </p>
  )
}
