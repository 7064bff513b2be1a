import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { PhonesDesk } from '@/components/desk/phones/phones-desk'
import { actorOf } from '@/lib/auth/actor'
import { may } from '@/lib/shop/permissions'
import { decideOn, takeOut } from './actions'

export const metadata: Metadata = { title: 'Phones' }

/** The shop's phones, for an owner; others go to the board. */
export default async function PhonesPage() {
  const actor = await actorOf()
  if (!actor || !may(actor.roles, 'device.revoke')) redirect('/desk')
  return <PhonesDesk takeOut={takeOut} decideOn={decideOn} />
}
