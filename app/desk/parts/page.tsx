import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { PartsDesk } from '@/components/desk/parts/parts-desk'
import { actorOf } from '@/lib/auth/actor'
import { may } from '@/lib/shop/permissions'
import { movePartLine } from './actions'

export const metadata: Metadata = { title: 'Parts' }

/** The parts desk, for who may see part requests; others go to the board. */
export default async function PartsPage() {
  const actor = await actorOf()
  if (!actor || !may(actor.roles, 'part.see')) redirect('/desk')
  return <PartsDesk move={movePartLine} />
}
