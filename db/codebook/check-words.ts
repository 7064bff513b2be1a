import { fleschKincaid } from 'flesch-kincaid'
import { syllable } from 'syllable'
import type { CheckItem, SwapItem, SymptomItem } from '@/lib/model/code-book'
import type { BookProblem, Books } from './book-problem'

/** Flesch-Kincaid grade (Kincaid et al. 1975); plain words for the public end at about 8 (common practice, no source). */
const HARDEST_GRADE = 8
/** A step is read with one hand on the machine (our own choice). */
const MOST_WORDS = 30
/** First look: minutes it may take, and what the machine may do meanwhile (our own choice). */
const LOOK_MINUTES = 3

/** [CB19] [CB21] Steps too hard to read, and first looks that are no look. */
export function checkWords({ shelf }: Books): BookProblem[] {
  const looks = new Map(shelf.check.map((c) => [c.id, c]))
  return [
    ...[...shelf.check, ...shelf.swap].flatMap(hardSteps),
    ...shelf.symptom.flatMap((symptom) => firstLooks(symptom, looks)),
    ...shelf.symptom.flatMap((symptom) => opensRightly(symptom, shelf.fault)),
  ]
}

const wordsOf = (text: string): string[] => text.match(/[\p{L}\p{N}'-]+/gu) ?? []
const sentencesOf = (text: string): number =>
  Math.max(1, (text.match(/[.!?:](?:\s|$)/g) ?? []).length)

/** The grade of school that reads these steps with ease. */
export function gradeOf(texts: readonly string[]): number {
  const words = texts.flatMap(wordsOf)
  return fleschKincaid({
    sentence: texts.reduce((sum, text) => sum + sentencesOf(text), 0),
    word: words.length,
    syllable: words.reduce((sum, word) => sum + syllable(word), 0),
  })
}

function hardSteps({ id, steps }: CheckItem | SwapItem): BookProblem[] {
  const found = (words: string): BookProblem => ({ kind: 'readingLevel', id, words })
  const grade = gradeOf(steps.map((s) => s.text))
  const long = steps.filter((s) => wordsOf(s.text).length > MOST_WORDS)
  return [
    ...(grade > HARDEST_GRADE ? [found(`steps read like grade ${grade.toFixed(1)}`)] : []),
    ...long.map((s) =>
      found(`a step of ${wordsOf(s.text).length} words: "${s.text.slice(0, 40)}"`),
    ),
  ]
}

function firstLooks(symptom: SymptomItem, checks: ReadonlyMap<string, CheckItem>): BookProblem[] {
  return symptom.firstLook.flatMap((id) => {
    const check = checks.get(id)
    if (check === undefined) return []
    const quick = check.minutes <= LOOK_MINUTES && ['off', 'keyOn'].includes(check.machineState)
    return quick && check.guideSafe
      ? []
      : [
          {
            kind: 'firstLook' as const,
            id: symptom.id,
            words: `${id} is no first look: at most ${LOOK_MINUTES} minutes, engine still, safe for a guide`,
          },
        ]
  })
}

function opensRightly(
  { id, opens }: SymptomItem,
  faults: readonly { shares: readonly { symptom: string }[] }[],
): BookProblem[] {
  const shared = faults.some((f) => f.shares.some((s) => s.symptom === id))
  return shared && opens === 'wayOut'
    ? [{ kind: 'orphan', id, words: 'opens the way out, and faults share it' }]
    : []
}
