import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { ImportDesk } from '@/components/desk/import/import-desk'
import { actorOf } from '@/lib/auth/actor'
import { may } from '@/lib/shop/permissions'

export const metadata: Metadata = { title: 'Take in a file' }

/** Where the file of a phone that cannot send is taken in; others go to the board. */
export default async function ImportPage() {
  const actor = await actorOf()
  if (!actor || !may(actor.roles, 'unsent.import')) redirect('/desk')
  return <ImportDesk />
}
