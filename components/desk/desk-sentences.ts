import { AppError } from '@/lib/model/result'
import type { ClosingProblem } from '@/lib/shop/closing'
import type { AssignProblem, LineProblem } from '@/lib/shop/desk-moves'
import type { MergeProblem } from '@/lib/shop/merge-rules'
import { LINE_STATE_WORDS } from '@/lib/shop/part-words'
import { JOB_STATE_WORDS } from '../field/words'
import type { DeskProblem } from './desk-actions'

/** Sentences for what can go wrong at the desk, keyed by kind. */
const READ: Record<string, string> = {
  noConnection: 'No connection to the shop. What is shown is what was last heard.',
  signedOut: 'You are signed out. Sign in again to go on.',
  forbidden: 'Your roles do not include this.',
  notFound: 'There is no such job in this shop.',
  serverTrouble: 'The shop’s server did not answer as it should.',
}

/** The sentence for a failed read. */
export function readSentence(error: Error): string {
  const kind = error instanceof AppError ? error.kind : 'unreadable'
  return READ[kind] ?? 'The answer of the shop’s server could not be read. Load the page again.'
}

export type ActedProblem =
  | DeskProblem
  | AssignProblem
  | LineProblem
  | MergeProblem
  | ClosingProblem
  | { kind: 'trouble' }

/** The sentence for a refused or failed action. */
export function actedSentence(problem: ActedProblem): string {
  switch (problem.kind) {
    case 'signIn':
      return 'You are signed out. Sign in again, then press once more.'
    case 'forbidden':
      return 'Your roles do not include this. Nothing was changed.'
    case 'notFound':
      return 'It is not there any more. Nothing was changed.'
    case 'invalid':
      return 'That could not be read. Check what you typed.'
    case 'jobClosed':
      return 'The job is closed. Nothing was changed.'
    case 'cannotTakeJobs':
      return 'Only mechanics and guides take jobs. Nothing was changed.'
    case 'movedMeanwhile':
      return `Somebody moved it meanwhile: it is ${LINE_STATE_WORDS[problem.now].toLowerCase()} now. Look again, then choose.`
    case 'illegalMove':
      return `From ${LINE_STATE_WORDS[problem.now].toLowerCase()} it cannot go there. Nothing was changed.`
    case 'jobMovedMeanwhile':
      return `Somebody moved the job meanwhile: it is ${JOB_STATE_WORDS[problem.now].toLowerCase()} now. Look again, then choose.`
    case 'causeMissing':
      return 'Name the cause, or choose unknown or no fault found.'
    case 'causeTooMuch':
      return 'With this grade no cause is named. Nothing was changed.'
    case 'sameRow':
      return 'A job cannot be merged into itself.'
    case 'alreadyMerged':
      return 'One of the two was merged meanwhile. Look again, then choose.'
    case 'notMerged':
      return 'It stands for itself already. Nothing was changed.'
    case 'trouble':
      return 'No answer from the shop, so it is not sure whether it was done. Look again in a moment.'
  }
}
