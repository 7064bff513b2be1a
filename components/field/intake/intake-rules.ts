import type { JobOpening } from '@/lib/model/job'
import type { IntakeDraft, IntakeStep } from './intake-draft'

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

/** What is wrong with a position as typed; null when nothing is. */
export const placeProblem = ({
  place,
  placeText,
}: Pick<IntakeDraft, 'place' | 'placeText'>): string | null =>
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
