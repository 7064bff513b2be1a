'use client'
import { useEffect } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import type { CheckItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import { entryMention } from '../log/entry-words'
import { KeyLink } from '../ui/key'
import { Screen } from '../ui/screen'
import { BeliefShift } from './belief-shift'
import { UndoBar } from './undo-bar'

type Props = {
  jobId: Id
  entry: LogEntry
  index: BookIndex
  check: CheckItem
  onUndone: () => void
}

/** After recording: what was kept, ten seconds to take it back, and what it did to the suspects. */
export function SavedOutcome({ jobId, entry, index, check, onUndone }: Props) {
  const { body } = entry
  const words =
    body.kind === 'couldNot' ? `Could not: ${body.reason}` : entryMention(entry.body, index)
  useFocusTitle()
  return (
    <Screen
      title="Recorded"
      second={check.name}
      foot={
        <KeyLink kind="main" href={`/field/jobs/${jobId}/checks`}>
          Back to checks
        </KeyLink>
      }
    >
      <UndoBar key={entry.id} jobId={jobId} entryId={entry.id} what={words} onUndone={onUndone} />
      {body.kind === 'couldNot' ? (
        <p>It moves no suspect and is not offered again.</p>
      ) : (
        <BeliefShift jobId={jobId} entryId={entry.id} />
      )}
      {body.kind === 'check' && isGood(check, body.outcome) && (
        <p>
          <b>This does not prove:</b> {check.passDoesNotProve}
        </p>
      )}
    </Screen>
  )
}

const isGood = (check: CheckItem, outcome: string): boolean =>
  check.outcomes.find((one) => one.id === outcome)?.good ?? false

/** After a save the focus goes to the heading that says so. */
export function useFocusTitle(): void {
  useEffect(() => {
    window.scrollTo(0, 0)
    document.getElementById('screen-title')?.focus()
  }, [])
}
