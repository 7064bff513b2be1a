'use client'

import { Figure } from '@/components/ui/figure'
import { printDegrees, printMinutes } from '@/lib/diag/place-text'
import type { Place } from '@/lib/model/place'
import { span } from './times'
import { useNow } from './use-now'

/** A position in the two ways people read it out, with how good and how old it is. */
export function PlaceShown({ place }: { place: Place }) {
  const now = useNow()
  return (
    <div className="grid gap-1">
      <p className="figures text-row">{printDegrees(place)}</p>
      <p className="figures text-second text-ink2">{printMinutes(place)}</p>
      <p className="text-second text-ink2">
        {place.source === 'fix' ? (
          <>
            Position fix,{' '}
            {place.accuracyMetres === null ? (
              'accuracy not told'
            ) : (
              <>
                good to <Figure value={Math.round(place.accuracyMetres)} unit="m" size="body" />
              </>
            )}
            , {span(now - Date.parse(place.at))} old.
          </>
        ) : (
          `Typed as ${place.asTyped ?? 'given'}, ${span(now - Date.parse(place.at))} ago.`
        )}
      </p>
    </div>
  )
}
