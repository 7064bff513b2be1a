'use client'

import { ReadingStrip } from '@/components/reading-strip/reading-strip'
import { stripOfBody } from '@/components/reading-strip/verdict'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { BookIndex } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import type { DeskJob } from '@/lib/model/desk'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import { clockTime } from '../../field/times'
import { useDesk } from '../desk-context'

/** The last living reading of the suspect part, as it was judged in the field; none: nothing. */
export function latestReading(
  entries: readonly LogEntry[],
): { at: string; body: ReadingBody } | null {
  for (const entry of living(entries).reverse()) {
    if (entry.body.kind === 'reading') return { at: entry.happenedAt, body: entry.body }
  }
  return null
}

/** The newest reading on its rule. */
export function LatestReading({ found, index }: { found: DeskJob; index: BookIndex | null }) {
  const { shop } = useDesk()
  const latest = latestReading(found.entries)
  if (!latest) return null
  const { body, at } = latest
  const strip = stripOfBody(body)
  const name = index?.checks.get(body.checkId)?.name ?? body.checkId
  const whose = body.subject === 'knownGood' ? ', known-good part' : ''
  const band = body.spec
    ? `Band: ${body.spec.name}, ${body.spec.source}.`
    : 'No band for this reading.'
  return (
    <section className="mt-7">
      <RuleEdge end={clockTime(at, shop.zone)}>
        {name}
        {whose}
      </RuleEdge>
      {strip ? (
        <div className="mt-2">
          <ReadingStrip reading={strip} provenance={`${band} ${body.meterName}.`} />
        </div>
      ) : (
        <p className="text-body">
          <span className="figures">{body.asTyped}</span> {body.unit}, not judged. {band}
        </p>
      )}
    </section>
  )
}
