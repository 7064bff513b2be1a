import { expect, test } from 'vitest'
import { oneEach, questions } from '@/components/field/symptom-questions'

const condition = (id: string, answers?: string) =>
  answers === undefined ? { id, name: id, tells: null } : { id, name: id, answers, tells: null }
const complaint = {
  conditions: [
    condition('wet'),
    condition('cold', 'Cold or hot?'),
    condition('hot', 'Cold or hot?'),
    condition('often', 'How often?'),
    condition('seldom', 'How often?'),
  ],
}

test('[F5] questions come in their order, what answers none of them last', () => {
  expect(questions(complaint)).toEqual(['Cold or hot?', 'How often?', undefined])
  expect(questions({ conditions: [] })).toEqual([])
})

test('[F5] of the answers to one question the one picked last stays; all else stays', () => {
  const said = ['wet', 'cold', 'often']
  expect(oneEach(complaint, said, [...said, 'hot'])).toEqual(['wet', 'often', 'hot'])
  expect(oneEach(complaint, ['cold'], ['wet', 'cold'])).toEqual(['wet', 'cold'])
  expect(oneEach(complaint, said, ['wet', 'often'])).toEqual(['wet', 'often'])
})
