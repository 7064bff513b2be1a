'use client'

import { ReadingStrip } from '@/components/reading-strip/reading-strip'
import { unitLabel } from '@/components/reading-strip/unit-words'
import { shownFigure, stripOfBody } from '@/components/reading-strip/verdict'
import { RuleEdge } from '@/components/ui/rule-edge'
import type { BookIndex } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import type { DeskJob } from '@/lib/model/desk'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import { whenWords } from '../../field/when-words'
import { useDesk } from '../desk-context'
import { useNow } from '../use-now'

type Read = { at: string; body: ReadingBody }

/**
 * The last living reading of the suspect part, as it was judged in the field, and the last one of a
 * known-good part by the same check; null where there is none.
 */
export function latestReading(
  entries: readonly LogEntry[],
): { read: Read; twin: Read | null } | null {
  const all = living(entries)
    .reverse()
    .flatMap(({ happenedAt, body }) => (body.kind === 'reading' ? [{ at: happenedAt, body }] : []))
  const read = all.find(({ body }) => body.subject === 'suspect') ?? all[0]
  if (!read) return null
  const twin = all.find(
    (one) =>
      one !== read && one.body.subject === 'knownGood' && one.body.checkId === read.body.checkId,
  )
  return { read, twin: twin ?? null }
}

const shown = (body: ReadingBody) =>
  `${shownFigure({ ...body, shown: body.asTyped })} ${unitLabel(body.quantity, body.unit)}`

/** Where the band comes from, which meter, and what a known-good part read. */
function provenance({ read: { body }, twin }: { read: Read; twin: Read | null }): string {
  const band = body.spec
    ? `Band: ${body.spec.name}, ${body.spec.source}.`
    : 'No band for this reading.'
  const good = twin ? ` A known-good part read ${shown(twin.body)}.` : ''
  return `${band} ${body.meterName}.${good}`
}

/** The newest reading on its rule. */
export function LatestReading({ found, index }: { found: DeskJob; index: BookIndex | null }) {
  const { shop } = useDesk()
  const now = useNow()
  const latest = latestReading(found.entries)
  if (!latest) return null
  const { body, at } = latest.read
  const strip = stripOfBody(body)
  return (
    <section className="mt-7">
      <RuleEdge end={whenWords(at, shop.zone, now)}>
        {index?.checks.get(body.checkId)?.name ?? body.checkId}
        {body.subject === 'knownGood' ? ', known-good part' : ''}
      </RuleEdge>
      {strip ? (
        <div className="mt-2">
          <ReadingStrip reading={strip} provenance={provenance(latest)} />
        </div>
      ) : (
        <p className="text-body">
          <span className="figures">{shown(body)}</span>, not judged. {provenance(latest)}
        </p>
      )}
    </section>
  )
}
