import { expect, test } from 'vitest'
import { gradeOf } from '@/db/codebook/check-words'

/** Grades follow 0.39 words per sentence + 11.8 syllables per word - 15.59 (Kincaid et al. 1975). */
test('[CB19] the grade is the formula of Kincaid and others', () => {
  expect(gradeOf(['The cat sat on the mat.'])).toBeCloseTo(0.39 * 6 + 11.8 * 1 - 15.59, 9)
  expect(gradeOf(['Turn it off. Pull the plug.'])).toBeCloseTo(0.39 * 3 + 11.8 * 1 - 15.59, 9)
})

test('[CB19] longer words and longer sentences are harder', () => {
  const plain = gradeOf(['Look at the plug.'])
  expect(gradeOf(['Examine the electrode thoroughly.'])).toBeGreaterThan(plain)
  expect(gradeOf(['Look at the plug and at the cap and at the lead.'])).toBeGreaterThan(plain)
})
