import type { BoardActions } from '@/components/desk/desk-actions'
import {
  assignPerson,
  closeJobAtDesk,
  mergeJob,
  reopenJobAtDesk,
  settleValue,
  unmergeJob,
} from './actions'
import { movePartLine } from './parts/actions'

/** Every server action of the board, for both of its pages. */
export const boardActions: BoardActions = {
  assign: assignPerson,
  move: movePartLine,
  close: closeJobAtDesk,
  reopen: reopenJobAtDesk,
  settle: settleValue,
  merge: mergeJob,
  unmerge: unmergeJob,
}
