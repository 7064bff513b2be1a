import type { Stamp } from '@/components/store/use-stamp'
import type { OpInput } from '@/lib/sync/protocol/op'
import type { HelpAnswer, IntakeDraft, Stranger } from './intake-draft'
import { needsHelp, openingOf } from './intake-rules'

const HELP_WORDS: Record<HelpAnswer, string> = {
  called: 'emergency services were called',
  cannotCall: 'they cannot be called from here',
  notNeeded: 'not needed, seen and judged here',
}

type With = { stamp: Stamp; symptomName: string | null; emergencyNumber: string | null }

/** Everything one new job records, in order: a stranger's machine, the job, the symptom, the answer on help. */
export function opsOf(
  draft: IntakeDraft,
  { stamp, symptomName, emergencyNumber }: With,
): { jobId: string; ops: OpInput[] } {
  const jobId = stamp.newId()
  const stranger = draft.stranger && strangerMachine(draft.stranger, stamp.newId())
  const machineId = stranger?.id ?? draft.machineId ?? ''
  const opening = openingOf(
    draft,
    { id: jobId, machineId, openedAt: stamp.now(), zone: stamp.zone },
    symptomName,
  )
  const ops: OpInput[] = []
  if (stranger !== null) {
    ops.push({ kind: 'machine.add', fields: stranger })
  }
  ops.push({ kind: 'job.open', fields: opening })
  if (draft.symptom !== null) {
    const own = draft.words.trim()
    ops.push(
      stamp.entry(jobId, {
        kind: 'symptom',
        symptom: draft.symptom,
        conditions: draft.conditions,
        words: own === '' ? null : own,
      }),
    )
  }
  if (needsHelp(draft) && draft.help !== null) {
    ops.push(stamp.entry(jobId, { kind: 'note', words: helpNote(draft, emergencyNumber) }))
  }
  return { jobId, ops }
}

function helpNote(draft: IntakeDraft, number: string | null): string {
  const who = [
    draft.dangers.includes('hurt') ? 'somebody hurt' : '',
    draft.dangers.includes('missing') ? 'somebody missing' : '',
  ]
    .filter(Boolean)
    .join(', ')
  const answer = draft.help === null ? 'no answer' : HELP_WORDS[draft.help]
  return `People: ${who}. Shown: emergency services first${number === null ? '' : ` (${number})`}. Answer: ${answer}.`
}

const orNull = (text: string): string | null => (text.trim() === '' ? null : text.trim())

function strangerMachine(stranger: Stranger, id: string) {
  const year = Number(stranger.year)
  return {
    id,
    modelId: null,
    unitNumber: null,
    makerTyped: orNull(stranger.maker),
    modelTyped: orNull(stranger.model),
    year: year >= 1950 && year <= 2100 ? year : null,
    serial: null,
    hours: null,
    features: stranger.features,
    fleet: false,
  }
}
