import type { Means, Plan } from '@/lib/diag/plan'
import { ENGINE_VERSION } from '@/lib/diag/version'
import type { Advice } from '@/lib/model/advice'
import type { SpecSheet, SpecValue } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'
import type { Instant } from '@/lib/model/time'
import type { Answer, CaseInput } from './work'

/**
 * Recommendations kept so that they can be shown again (rule R23). Entries go in by id: they never
 * change and are in the job log; everything else the engine read goes in whole.
 */
export type AdviceInputs = Omit<CaseInput, 'entries'> & {
  entryIds: Id[]
  means: Means | null
  /** The sheet did not fit into one op: it has to be taken from the model to recompute. */
  specLeftOut?: true
}

/** Room for the inputs in one op (16 kB with what is shown beside them). */
const INPUT_CHARS = 11_000

const fitted = (inputs: AdviceInputs): AdviceInputs =>
  JSON.stringify(inputs).length <= INPUT_CHARS
    ? inputs
    : { ...inputs, spec: null, specLeftOut: true }

/** The spec sheet as the engine reads it: figures, no prose, so that it fits into one kept advice. */
export function specForEngine(spec: SpecSheet | null): SpecSheet | null {
  if (spec === null) return null
  const bare = (value: SpecValue): SpecValue => ({
    ...value,
    name: '',
    conditions: null,
    source: '',
  })
  return {
    ...spec,
    showCodes: { steps: [], clearSteps: [], source: '' },
    towPreparation: null,
    components: spec.components.map((part) => ({
      id: part.id,
      name: '',
      place: '',
      setups: part.setups,
      fasteners: null,
      connector: null,
      pins: [],
      torqueNm: null,
      values: part.values.map(bare),
      source: '',
    })),
    parts: spec.parts.map((part) => ({ ...part, source: '' })),
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
  const { entries, ...rest } = input.case
  const inputs = fitted({ ...rest, entryIds: entries.map((entry) => entry.id), means })
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
      decides: plan.decides,
      suspects: answer.belief.suspects.slice(0, 12).map(({ fault, chance }) => ({ fault, chance })),
    },
    acted: input.chose === plan.next.id ? 'followed' : 'overridden',
    chose: input.chose,
    reason: input.reason,
  }
}
