import type { SymptomItem } from '@/lib/model/code-book'
import type { BookProblem, Books } from './book-problem'

/** [CB23] Questions of a complaint: two answers or more, of which no fault is told by more than 100 of 100. */
export function checkAsked({ shelf }: Books): BookProblem[] {
  return shelf.symptom.flatMap((symptom) => {
    const questions = new Set(symptom.conditions.flatMap((c) => c.answers ?? []))
    return [...questions].flatMap((question) => answersTo(symptom, question))
  })
}

function answersTo({ id, conditions }: SymptomItem, question: string): BookProblem[] {
  const answers = conditions.filter((c) => c.answers === question)
  const found = (words: string): BookProblem => ({
    kind: 'asked',
    id,
    words: `${question} ${words}`,
  })
  if (answers.length < 2) return [found('has one answer: it is no question')]
  const faults = new Set(answers.flatMap((c) => Object.keys(c.tells?.of100 ?? {})))
  return ['otherwise', ...faults].flatMap((fault) => {
    const sum = answers.reduce(
      (all, { tells }) => all + (tells?.of100[fault] ?? tells?.otherwise ?? 0),
      0,
    )
    return sum > 100 ? [found(`is answered ${sum} times of 100 with ${fault}`)] : []
  })
}
