import type { Metadata } from 'next'
import { Board } from '@/components/desk/board/board'
import { boardActions } from '../../board-actions'

export const metadata: Metadata = { title: 'Job' }

/** The same board with the job of the address picked. */
export default function DeskJobPage() {
  return <Board actions={boardActions} />
}
