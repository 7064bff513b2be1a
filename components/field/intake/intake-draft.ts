import type { Features } from '@/lib/model/features'
import type { BEFORE, JobOpening } from '@/lib/model/job'
import type { Place } from '@/lib/model/place'

/** A new job while it is being written down. Kept to the keystroke, so all of it is plain JSON. */
export const STEPS = ['people', 'machine', 'complaint', 'place'] as const
export type IntakeStep = (typeof STEPS)[number]

const DANGERS = ['hurt', 'missing', 'exposed'] as const
type Danger = (typeof DANGERS)[number]

const HELP_ANSWERS = ['called', 'cannotCall', 'notNeeded'] as const
export type HelpAnswer = (typeof HELP_ANSWERS)[number]

export type Stranger = { maker: string; model: string; year: string; features: Features }

export type IntakeDraft = {
  step: IntakeStep
  count: number
  dangers: Danger[]
  help: HelpAnswer | null
  machineId: string | null
  stranger: Stranger | null
  symptom: string | null
  conditions: string[]
  words: string
  lamp: 'on' | 'off' | 'notLooked' | null
  before: (typeof BEFORE)[number][]
  place: Place | null
  placeText: string
  /** The last fix, given back when what was typed over it is cleared. Not in drafts begun before it was kept. */
  lastFix?: Place | null
  placeWords: string
  air: string
  weather: string
}

export const INTAKE_KEY = 'job.new'

export const EMPTY_INTAKE: IntakeDraft = {
  step: 'people',
  count: 1,
  dangers: [],
  help: null,
  machineId: null,
  stranger: null,
  symptom: null,
  conditions: [],
  words: '',
  lamp: null,
  before: [],
  place: null,
  placeText: '',
  lastFix: null,
  placeWords: '',
  air: '',
  weather: '',
}

type Change = (next: Partial<IntakeDraft>) => void
export type StepProps = { draft: IntakeDraft; change: Change }

/** True when somebody is hurt or missing: emergency services come before everything else. */
export const needsHelp = (draft: Pick<IntakeDraft, 'dangers'>): boolean =>
  draft.dangers.includes('hurt') || draft.dangers.includes('missing')

/** A number as typed, comma or point, any minus; null when it is none or empty. */
export function typedNumber(text: string): number | null {
  const plain = text.trim().replace('−', '-').replace(',', '.')
  return /^-?\d+(\.\d+)?$/.test(plain) ? Number(plain) : null
}

const MISSING: Record<IntakeStep, (draft: IntakeDraft) => string | null> = {
  people: (draft) =>
    needsHelp(draft) && draft.help === null
      ? 'Answer the line about emergency services first.'
      : null,
  machine: (draft) =>
    draft.machineId === null && draft.stranger === null ? 'Pick a machine first.' : null,
  complaint: (draft) =>
    draft.symptom === null && draft.words.trim() === ''
      ? 'Pick what it does, or write it down.'
      : null,
  place: (draft) => airProblem(draft.air) ?? placeProblem(draft),
}

/** What stands in the way of a step, in one sentence; null when it may go on. */
export const missingFrom = (draft: IntakeDraft, step: IntakeStep): string | null =>
  MISSING[step](draft)

/** What is wrong with an air temperature as typed; null when nothing is. */
export function airProblem(text: string): string | null {
  const air = text.trim() === '' ? 0 : typedNumber(text)
  return air === null || Math.abs(air) > 60
    ? 'Air temperature: a number from −60 to 60, or nothing.'
    : null
}

const placeProblem = ({ place, placeText }: IntakeDraft): string | null =>
  placeText.trim() !== '' && place?.asTyped !== placeText.trim()
    ? 'The typed position cannot be read yet. Mend it or clear it.'
    : null

/** The job's opening from the draft. `symptomName` stands in where the rider's own words are missing. */
export function openingOf(
  draft: IntakeDraft,
  stamp: { id: string; machineId: string; openedAt: string; zone: string },
  symptomName: string | null,
): JobOpening {
  const own = draft.words.trim()
  const placeWords = draft.placeWords.trim()
  return {
    ...stamp,
    people: {
      count: draft.count,
      hurt: draft.dangers.includes('hurt'),
      missing: draft.dangers.includes('missing'),
      exposed: draft.dangers.includes('exposed'),
    },
    place: draft.place && { ...draft.place, words: placeWords === '' ? null : placeWords },
    complaint: {
      words: own === '' ? (symptomName ?? 'No words given') : own,
      symptom: draft.symptom,
      lampOn: draft.lamp === null || draft.lamp === 'notLooked' ? null : draft.lamp === 'on',
    },
    before: draft.before,
    airTempC: typedNumber(draft.air),
    weather: draft.weather.trim() === '' ? null : draft.weather.trim(),
  }
}
