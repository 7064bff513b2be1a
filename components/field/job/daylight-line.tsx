'use client'

import { type Light, lightAt } from '@/lib/diag/light'
import type { Place } from '@/lib/model/place'
import { clockTime, span } from '../times'
import { useNow } from '../use-now'

/** Whether it is light at the job's place now, and until when. */
export function DaylightLine({ place, zone }: { place: Place; zone: string }) {
  const { before, time, after } = daylightWords(lightAt(place, useNow()), zone)
  return (
    <p>
      {before}
      {time === null ? null : <b className="figures">{time}</b>}
      {after}
    </p>
  )
}

type Words = { before: string; time: string | null; after: string }

/** The line in words around its one figure: "Dark until 07:10 (civil dawn), 4 h 10 from now." */
export function daylightWords(light: Light, zone: string): Words {
  const at = (ms: number) => clockTime(new Date(ms).toISOString(), zone)
  switch (light.kind) {
    case 'light': {
      const sunset = light.sunset === null ? '' : `Sunset ${at(light.sunset)}. `
      const after = ` (civil dusk), ${span(light.untilMs)} from now.`
      return { before: `${sunset}Dark from `, time: at(light.dusk), after }
    }
    case 'dark': {
      const after = ` (civil dawn), ${span(light.untilMs)} from now.`
      return { before: 'It is dark. Light from ', time: at(light.dawn), after }
    }
    case 'never':
      return { before: NEVER[light.which], time: null, after: '' }
  }
}

const NEVER: Record<Extract<Light, { kind: 'never' }>['which'], string> = {
  rises: 'The sun does not rise here today.',
  sets: 'It does not get dark here today.',
  darkens: 'It does not get dark here today.',
}
