import type { Result } from '@/lib/model/result'
import type { ClosingProblem } from '@/lib/shop/closing'
import type { AssignProblem, LineProblem } from '@/lib/shop/desk-moves'
import type { MergeProblem } from '@/lib/shop/merge-rules'
import type { AssignForm } from './hands/assign.schema'
import type { CloseForm, ReopenForm } from './job/closing.schema'
import type { MergeForm, UnmergeForm } from './merge/merge.schema'
import type { LineMoveForm } from './parts/line-move.schema'
import type { SettleForm } from './values/settle.schema'

/** What every desk action may answer besides its own refusals. */
export type DeskProblem = { kind: 'signIn' | 'invalid' | 'forbidden' | 'notFound' }

/** The server actions of the desk; pages hand them in, so that components know no routes. */
export type AssignAction = (form: AssignForm) => Promise<Result<null, DeskProblem | AssignProblem>>
export type MoveLineAction = (
  form: LineMoveForm,
) => Promise<Result<null, DeskProblem | LineProblem>>
export type MergeAction = (form: MergeForm) => Promise<Result<null, DeskProblem | MergeProblem>>
export type UnmergeAction = (form: UnmergeForm) => Promise<Result<null, DeskProblem | MergeProblem>>

export type SettleAction = (form: SettleForm) => Promise<Result<null, DeskProblem>>

/** Merging a job into another, and undoing it. */
export type MergeActions = { merge: MergeAction; unmerge: UnmergeAction }
export type CloseAction = (form: CloseForm) => Promise<Result<null, DeskProblem | ClosingProblem>>
export type ReopenAction = (form: ReopenForm) => Promise<Result<null, DeskProblem | ClosingProblem>>

/** All that can be done on the board; its page hands them in as one. */
export type BoardActions = {
  assign: AssignAction
  move: MoveLineAction
  close: CloseAction
  reopen: ReopenAction
  settle: SettleAction
} & MergeActions
