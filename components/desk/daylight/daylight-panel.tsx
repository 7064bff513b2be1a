'use client'

import { type Light, lightAt } from '@/lib/diag/light'
import type { Place } from '@/lib/model/place'
import { clockTime } from '../../field/times'
import { useDesk } from '../desk-context'
import { hoursAndMinutes } from '../desk-time'
import { useNow } from '../use-now'
import { dayWindow } from './day-window'
import { DaylightRule } from './daylight-rule'

const NEVER_WORDS = {
  rises: 'The sun does not rise there today.',
  sets: 'The sun does not set there today.',
  darkens: 'It does not get dark there tonight: civil twilight lasts all night.',
}

/** Daylight at the job's place: hours and minutes to dark, and the rule of hours. */
export function DaylightPanel({ place }: { place: Place | null }) {
  const now = useNow()
  if (!place) return <p className="text-body">No position: daylight there cannot be told.</p>
  if (now === null) return null
  return (
    <section aria-label="Daylight at the job">
      <LightFigure light={lightAt(place, now)} />
      <DaylightRule day={dayWindow(place, now)} now={now} light={lightAt(place, now)} />
    </section>
  )
}

function LightFigure({ light }: { light: Light }) {
  const { shop } = useDesk()
  if (light.kind === 'never')
    return <p className="text-row font-bold">{NEVER_WORDS[light.which]}</p>
  const time = (ms: number) => clockTime(new Date(ms).toISOString(), shop.zone)
  const second =
    light.kind === 'dark'
      ? `civil dawn ${time(light.dawn)}`
      : [light.sunset ? `sunset ${time(light.sunset)}` : '', `dark ${time(light.dusk)}`]
          .filter(Boolean)
          .join(', ')
  return (
    <p className="flex items-center gap-3">
      <span className="figures text-hero">{hoursAndMinutes(light.untilMs)}</span>
      <span className="leading-tight">
        <span className="block text-body font-bold">
          {light.kind === 'dark' ? 'to first light out there' : 'to dark out there'}
        </span>
        <span className="block text-second text-ink2">{second}</span>
      </span>
    </p>
  )
}
