'use client'
import { type BookIndex, wordName } from '@/lib/diag/book-index'
import type { DoneStep, SwapProgress } from '@/lib/diag/swap-progress'
import type { SwapItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import { useBeliefUpTo } from '../engine/use-belief'
import { clockTime } from '../field/times'
import { of100 } from '../reading-strip/figures'
import { useJobZone } from '../store/use-job-zone'
import { RuleEdge } from '../ui/rule-edge'
import { doneWords, STEP_WORDS, swapSays } from './swap-words'

type Props = { jobId: Id; swap: SwapItem; progress: SwapProgress; index: BookIndex }

/** The steps done so far in their order, with the part's chance after each, and what they say together. */
export function SwapDone({ jobId, swap, progress, index }: Props) {
  const part = wordName(index, 'part', swap.part).toLowerCase()
  const says = swapSays(progress, part)
  if (says === null) return null
  return (
    <section aria-labelledby="done" className="grid gap-2">
      <RuleEdge id="done">Done so far</RuleEdge>
      <ol className="grid">
        {progress.done.map((one) => (
          <Done key={one.entry.id} jobId={jobId} swap={swap} one={one} part={part} />
        ))}
      </ol>
      <p aria-live="polite" className="text-row font-bold">
        {says}
      </p>
    </section>
  )
}

function Done({
  jobId,
  swap,
  one,
  part,
}: {
  jobId: Id
  swap: SwapItem
  one: DoneStep
  part: string
}) {
  const { answer } = useBeliefUpTo(jobId, one.entry.id)
  const zone = useJobZone(jobId)
  const suspect = answer?.belief.suspects.find((row) => row.fault === swap.fault)
  return (
    <li className="flex min-h-row items-center gap-3 border-b-[1.5px] border-rule py-2">
      <span className="figures text-ink2">{clockTime(one.entry.happenedAt, zone)}</span>
      <span className="min-w-0 flex-1">
        <b className="block">{STEP_WORDS[one.body.step].title(part)}</b>
        <span className="block">{doneWords(one.body)}</span>
        {one.body.partWords !== null && (
          <span className="block text-second text-ink2">{one.body.partWords}</span>
        )}
      </span>
      {suspect !== undefined && (
        <span className="shrink-0 text-right">
          <span className="figures block text-key">{of100(suspect.chance)}</span>
          <span className="block text-second text-ink2">of 100</span>
        </span>
      )}
    </li>
  )
}
