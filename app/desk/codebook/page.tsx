import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { BookDesk } from '@/components/desk/codebook/book-desk'
import { actorOf } from '@/lib/auth/actor'
import { may } from '@/lib/shop/permissions'
import { drop, publish, takeBack } from './actions'

export const metadata: Metadata = { title: 'Code book' }

/** The shop's code book, for an owner; others go to the board. */
export default async function CodeBookPage() {
  const actor = await actorOf()
  if (!actor || !may(actor.roles, 'book.publish')) redirect('/desk')
  return <BookDesk actions={{ publish, drop, withdraw: takeBack }} />
}
