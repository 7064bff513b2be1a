import { expect, type Page } from '@playwright/test'

/** Keys and looks of the main job, and what its specification asks to see. */
export const press = (page: Page, name: string | RegExp) =>
  page.getByRole('button', { name, exact: true }).click()
export const follow = (page: Page, name: string | RegExp) =>
  page.getByRole('link', { name }).click()

/** Above 90 of 100: what the specification of the main job asks after the swap back. */
export const ABOVE_90 = /^(9[1-9]|over 99)$/

/** The job log when all is done, in order. */
export const DONE = [
  'symptom',
  'code',
  'reading',
  'reading',
  'spareFitted',
  'oldRefitted',
  'newFitted',
  'fix',
  'codesCleared',
  'codesCleared',
  'proofRun',
  'wayOut',
  'note',
  'photo',
]

/** Why the pocket meter cannot decide 0.45 to 0.55 ohm, and what would (worked case of the readings). */
export const FITNESS = [
  /it reads ±0\.395 ohm \(k = 2\)/,
  /^Meter accuracy: ±0\.308 ohm, 81 % of the variance/,
  /^Test leads: ±0\.150 ohm, 19 % of the variance/,
  'What would decide',
  /^Four-wire: .* u 0\.005\.$/,
  /^Null the leads: u becomes 0\.180 .*that alone does not reach 95 %\.$/,
  /^Swap with a known-good part/,
]

/** The chance of 100 in the row of a suspect. */
export const chanceIn = (page: Page, fault: string) =>
  page.locator(`[data-row="${fault}"] .figures`).first()

/** Waits until the phone's store holds what was just typed. */
export const draftKept = (page: Page) =>
  expect(page.locator('[data-draft]')).toHaveAttribute('data-draft', 'kept')
