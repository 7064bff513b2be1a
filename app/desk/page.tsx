import type { Metadata } from 'next'
import { Board } from '@/components/desk/board/board'
import { boardActions } from './board-actions'

export const metadata: Metadata = { title: 'Desk' }

/** The board with no job picked. */
export default function DeskPage() {
  return <Board actions={boardActions} />
}
