import type { Means, Plan } from '@/lib/diag/plan'
import { ENGINE_VERSION } from '@/lib/diag/version'
import type { Advice } from '@/lib/model/advice'
import type { Id } from '@/lib/model/id'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Instant } from '@/lib/model/time'
import { decidesWords } from './decides'
import { keptSpec, type SpecKept, specOfKept } from './spec-kept'
import type { Answer, CaseInput } from './work'

/**
 * Recommendations kept so that they can be shown again (rule R23). Entries go in by id: they never
 * change and are in the job log; everything else the engine read goes in whole.
 */
export type AdviceInputs = Omit<CaseInput, 'entries' | 'spec'> & {
  entryIds: Id[]
  means: Means | null
  spec: SpecKept | null
}

/** The case as the engine had it, from what was kept and the entries of the job log by id. */
export function caseOfAdvice(inputs: AdviceInputs, entries: readonly LogEntry[]): CaseInput {
  const { entryIds, means: _means, spec, ...rest } = inputs
  const byId = new Map(entries.map((entry) => [entry.id, entry]))
  return {
    ...rest,
    spec: spec === null ? null : specOfKept(spec),
    entries: entryIds.map((id) => byId.get(id)).filter((entry) => entry !== undefined),
  }
}

/** One advice a person followed or overrode, ready to be kept. */
export function adviceOf(input: {
  id: Id
  jobId: Id
  at: Instant
  bookVersion: number
  case: CaseInput
  means: Means | null
  answer: Answer
  plan: Plan
  chose: string
  reason: string | null
}): Advice {
  const { plan, answer, means } = input
  const { entries, spec, ...rest } = input.case
  const inputs: AdviceInputs = {
    ...rest,
    spec: spec === null ? null : keptSpec(spec),
    entryIds: entries.map((entry) => entry.id),
    means,
  }
  return {
    id: input.id,
    jobId: input.jobId,
    at: input.at,
    engineVersion: ENGINE_VERSION,
    bookVersion: input.bookVersion,
    inputs,
    shown: {
      next: plan.next,
      runnerUp: plan.runnerUp,
      differenceMinor: plan.differenceMinor,
      equal: plan.equal,
      gap: plan.gap,
      decides: decidesWords(answer, plan),
      suspects: answer.belief.suspects.slice(0, 12).map(({ fault, chance }) => ({ fault, chance })),
    },
    acted: input.chose === plan.next.id ? 'followed' : 'overridden',
    chose: input.chose,
    reason: input.reason,
  }
}
