import { type Belief, belief } from '@/lib/diag/belief'
import type { BookIndex } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { type Outcome, outlook } from '@/lib/diag/outlook'
import { type Means, nextStep, type Plan } from '@/lib/diag/plan'
import type { Features } from '@/lib/model/features'
import type { Job } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { SpecSheet } from '@/lib/model/machine-model'
import type { MeterProfile } from '@/lib/model/meter-profile'
import { type Action, outlookKey } from './outlook-key'

/** What the engine is asked about, without the code book: plain data, fit to be sent to the worker. */
export type CaseInput = {
  features: Features
  spec: SpecSheet | null
  job: Pick<Job, 'complaint'>
  entries: readonly LogEntry[]
  meter: MeterProfile | null
}

export type Question = {
  case: CaseInput
  /** Given when a plan is wanted too. */
  means: Means | null
  /** The outlook of these is wanted; that of the plan's own next step comes without asking. */
  outlookOf: readonly Action[]
}
export type Answer = {
  belief: Belief
  plan: Plan | null
  /** By `check:id` or `swap:id`. */
  outlooks: Record<string, Outcome[]>
}

/** The engine's whole answer to one question. The same function runs in the worker and on the page. */
export function workOut(index: BookIndex, question: Question): Answer {
  const built = buildCase({ index, ...question.case })
  const plan = question.means === null ? null : nextStep(built, question.means)
  const wanted: Action[] = [...question.outlookOf]
  const next = plan?.next
  if (next !== undefined && (next.type === 'check' || next.type === 'swap'))
    wanted.push({ kind: next.type, id: next.id })
  const outlooks: Record<string, Outcome[]> = {}
  for (const action of wanted) outlooks[outlookKey(action)] = outlook(built, action)
  return { belief: belief(built), plan, outlooks }
}
