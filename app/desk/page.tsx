import type { Metadata } from 'next'
import { Board } from '@/components/desk/board/board'
import { assignPerson } from './actions'
import { movePartLine } from './parts/actions'

export const metadata: Metadata = { title: 'Desk' }

/** The board with no job picked. */
export default function DeskPage() {
  return <Board assign={assignPerson} move={movePartLine} />
}
