import type { Features } from '@/lib/model/features'
import type { BEFORE } from '@/lib/model/job'
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
