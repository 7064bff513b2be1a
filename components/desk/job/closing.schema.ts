import * as z from 'zod/mini'
import { causeGrade, closing } from '@/lib/model/closing'
import { id } from '@/lib/model/id'
import { jobState } from '@/lib/model/job'

/** Closing and reopening; `from` is the state the screen showed. */
export const closeForm = z.strictObject({ jobId: id, from: jobState, closing })
export type CloseForm = z.infer<typeof closeForm>

export const reopenForm = z.strictObject({
  jobId: id,
  from: jobState,
  reason: closing.shape.reason,
})
export type ReopenForm = z.infer<typeof reopenForm>

/** Chosen in the list of causes for one that is not on it. */
export const OWN_WORDS = 'ownWords'

/** What is picked and typed; `cause` is a suspect's id or OWN_WORDS. */
export const closingBoxes = z
  .strictObject({
    grade: z.nullable(causeGrade),
    cause: z.string(),
    causeWords: z.string().check(z.trim(), z.maxLength(300, 'At most 300 characters.')),
    reason: z
      .string()
      .check(
        z.trim(),
        z.minLength(1, 'Say in a few words what was done or why it ends here.'),
        z.maxLength(500, 'At most 500 characters.'),
      ),
  })
  .check(
    z.refine(({ grade }) => grade !== null, {
      path: ['grade'],
      error: 'Choose how sure the cause is.',
    }),
    z.refine((boxes) => !wantsCause(boxes) || boxes.cause !== '', {
      path: ['cause'],
      error: 'Choose the cause, or your own words.',
    }),
    z.refine(
      (boxes) => !wantsCause(boxes) || boxes.cause !== OWN_WORDS || boxes.causeWords !== '',
      { path: ['causeWords'], error: 'Type the cause.' },
    ),
  )
export type ClosingBoxes = z.infer<typeof closingBoxes>

/** True while the chosen grade names a cause. */
export const wantsCause = ({ grade }: Pick<ClosingBoxes, 'grade'>): boolean =>
  grade === 'proved' || grade === 'likely'

/** The closing of boxes that were found whole. */
export function closingOf(boxes: ClosingBoxes): CloseForm['closing'] {
  const { grade, cause, causeWords, reason } = boxes
  const named =
    cause === OWN_WORDS
      ? ({ kind: 'words', words: causeWords } as const)
      : ({ kind: 'fault', fault: cause } as const)
  return { grade: grade ?? 'unknown', cause: wantsCause(boxes) ? named : null, reason }
}
