'use client'
import type { BookIndex } from '@/lib/diag/book-index'
import type { Plan } from '@/lib/diag/plan'
import type { Id } from '@/lib/model/id'
import { moneyWords } from '@/lib/shop/currency'
import { RuleEdge } from '../ui/rule-edge'
import { takesWords } from './next-plate'
import { type AdviceState, PickInstead } from './pick-instead'
import type { ActOn } from './use-act-on'

type Props = {
  jobId: Id
  plan: Plan
  currency: string
  index: BookIndex
  actOn: ActOn
  advice: AdviceState
}

/** The second-best step and why it loses. */
export function RunnerUp({ jobId, plan, currency, index, actOn, advice }: Props) {
  const { runnerUp, next } = plan
  if (runnerUp === null) return null
  return (
    <section aria-labelledby="runner-up" className="grid gap-1">
      <RuleEdge id="runner-up">Runner-up</RuleEdge>
      <PickInstead
        key={`${runnerUp.type} ${runnerUp.id}`}
        jobId={jobId}
        action={runnerUp}
        insteadOf={next}
        actOn={actOn}
        advice={advice}
        second={takesWords(runnerUp, index)}
      />
      <p className="text-second">{whyItLoses(plan, currency)}</p>
    </section>
  )
}

/** One sentence: by how much the runner-up makes the rest of the job dearer, or that it is a tie. */
export function whyItLoses(plan: Plan, currency: string): string {
  if (plan.equal) return 'It comes out equal: pick whichever is nearer to hand.'
  const more = moneyWords(Math.round(plan.differenceMinor), currency)
  return `It loses: with it first, the rest of the job is expected to cost ${more} more.`
}
