'use client'
import type { BookIndex } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { type JobCase, useCase } from '../engine/use-case'
import { useBook } from '../store/use-book'
import { Screen } from '../ui/screen'
import { BookGate } from './book-gate'
import { ReadingPad } from './reading-pad'
import { SavedReading } from './saved-reading'
import { useJustSaved } from './use-just-saved'
import { NotYours, useMayLog } from './use-may'

/** One reading: typed on the large keypad, judged as it is typed, kept, and what it did (F4). */
export function ReadingScreen({ jobId, checkId }: { jobId: Id; checkId: string }) {
  const { index } = useBook()
  const found = useCase(jobId)
  const check = index?.checks.get(checkId) ?? null
  return (
    <BookGate>
      {index === null || found === null ? (
        <Screen title="Reading">
          <p role="status">Opening the check.</p>
        </Screen>
      ) : check === null || check.reading === null ? (
        <Screen title="No figure here">
          <p>This check has no figure to read. Record its outcome on the check itself.</p>
        </Screen>
      ) : (
        <One jobId={jobId} check={check} index={index} found={found} />
      )}
    </BookGate>
  )
}

type Props = { jobId: Id; check: CheckItem; index: BookIndex; found: JobCase }

function One({ jobId, check, index, found }: Props) {
  const { savedId, keepSaved, forget } = useJustSaved(found.entries)
  const mine = useMayLog('reading', check.guideSafe)
  const saved = found.entries.find((entry) => entry.id === savedId)
  if (!mine)
    return (
      <Screen title={check.name}>
        <NotYours what="This reading" />
      </Screen>
    )
  return saved !== undefined && saved.body.kind === 'reading' ? (
    <SavedReading
      key={saved.id}
      jobId={jobId}
      entry={saved}
      body={saved.body}
      check={check}
      index={index}
      entries={found.entries}
      onAgain={forget}
    />
  ) : (
    <ReadingPad jobId={jobId} check={check} found={found} onSaved={keepSaved} />
  )
}
