'use client'
import { useState } from 'react'
import type { BookIndex } from '@/lib/diag/book-index'
import { wordName } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import { type SwapProgress, swapProgress } from '@/lib/diag/swap-progress'
import type { SwapItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { type JobCase, useCase } from '../engine/use-case'
import { useBook } from '../store/use-book'
import { Caution } from '../ui/caution'
import { Key, KeyLink } from '../ui/key'
import { RuleEdge } from '../ui/rule-edge'
import { Screen } from '../ui/screen'
import { Steps } from '../ui/steps'
import { BookGate } from './book-gate'
import { SwapDone } from './swap-done'
import { SwapStepForm } from './swap-step-form'
import { UndoBar } from './undo-bar'
import { useJustSaved } from './use-just-saved'
import { NotYours, useMayLog } from './use-may'
import { minutesWords } from './words'

/** A swap done properly: good part in, old part back, new part in, each step its own line of the log (F5). */
export function SwapScreen({ jobId, swapId }: { jobId: Id; swapId: string }) {
  const { index, version } = useBook()
  const found = useCase(jobId)
  const swap = index?.swaps.get(swapId) ?? null
  return (
    <BookGate>
      {index === null || found === null ? (
        <Screen title="Swap">
          <p role="status">Opening the swap.</p>
        </Screen>
      ) : swap === null ? (
        <Screen title="Unknown swap">
          <p>
            The code book on this phone, version {version}, has no swap called “{swapId}”.
          </p>
        </Screen>
      ) : (
        <OneSwap jobId={jobId} swap={swap} index={index} found={found} />
      )}
    </BookGate>
  )
}

type Props = { jobId: Id; swap: SwapItem; index: BookIndex; found: JobCase }

function OneSwap({ jobId, swap, index, found }: Props) {
  const progress = swapProgress(swap.id, living(found.entries))
  const { savedId, keepSaved, forget } = useJustSaved(found.entries)
  const part = wordName(index, 'part', swap.part)
  const mine = useMayLog('swap', swap.guideSafe)
  return (
    <Screen
      title={swap.name}
      second={`${minutesWords(swap.minutes)}. Only the whole order proves the part.`}
      foot={
        progress.next === null ? (
          <KeyLink kind="main" href={afterHref(jobId, swap, progress)}>
            {progress.noChange ? 'Back to checks' : 'Record the fix'}
          </KeyLink>
        ) : null
      }
    >
      {savedId !== null && (
        <UndoBar
          key={savedId}
          jobId={jobId}
          entryId={savedId}
          what="Step recorded"
          onUndone={forget}
        />
      )}
      <SwapDone jobId={jobId} swap={swap} progress={progress} index={index} />
      {progress.next !== null && (
        <>
          {swap.cautions.map((one) => (
            <Caution key={one.text} signal={one.signal}>
              {one.text}
            </Caution>
          ))}
          <How swap={swap} begun={progress.done.length > 0} />
          {mine ? (
            <SwapStepForm
              jobId={jobId}
              swap={swap}
              part={part}
              step={progress.next}
              onSaved={keepSaved}
            />
          ) : (
            <NotYours what="This swap" />
          )}
        </>
      )}
    </Screen>
  )
}

/** All steps before the first answer; once begun they fold away, the cautions stay. */
function How({ swap, begun }: { swap: SwapItem; begun: boolean }) {
  const [picked, setPicked] = useState<boolean | null>(null)
  const open = picked ?? !begun
  return (
    <section aria-labelledby="how" className="grid gap-3">
      <RuleEdge id="how">How</RuleEdge>
      {open && <Steps steps={swap.steps} />}
      {open && (
        <p className="text-second text-ink2">
          {swap.basisWords} Source: {swap.source}.
        </p>
      )}
      <Key small aria-expanded={open} onClick={() => setPicked(!open)}>
        {open ? 'Fold the steps' : 'Show the steps'}
      </Key>
    </section>
  )
}

const afterHref = (jobId: Id, swap: SwapItem, progress: SwapProgress): string =>
  progress.noChange
    ? `/field/jobs/${jobId}/checks`
    : `/field/jobs/${jobId}/fix?fault=${encodeURIComponent(swap.fault)}`
