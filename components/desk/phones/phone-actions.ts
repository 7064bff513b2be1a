import type { DecidedAnswer, DecideForm, RevokeForm } from '@/lib/model/phones'
import type { Result } from '@/lib/model/result'
import type { DeskProblem } from '../desk-actions'

export type PhoneProblem = DeskProblem | { kind: 'decidedBefore' | 'busy' }

/** What became of one item. */
export type Decided = DecidedAnswer['decided'][number]

/** The server actions of the list of phones; the page hands them in. */
export type RevokeAction = (form: RevokeForm) => Promise<Result<null, DeskProblem>>
export type DecideAction = (form: DecideForm) => Promise<Result<Decided[], PhoneProblem>>
