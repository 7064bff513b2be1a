import { redirect } from 'next/navigation'
import type { ReactNode } from 'react'
import { DeskProvider } from '@/components/desk/desk-context'
import { DeskHeader } from '@/components/desk/desk-header'
import { LiveRegion } from '@/components/ui/live-region'
import { readDeskShop } from '@/db/queries/desk-shop'
import { actorOf } from '@/lib/auth/actor'
import { may } from '@/lib/shop/permissions'
import '@/components/desk/desk.css'

export const dynamic = 'force-dynamic'

/** Lets in who may see the desk: nobody signed in goes to sign in, a guide to the field. */
export default async function DeskLayout({ children }: { children: ReactNode }) {
  const actor = await actorOf()
  if (!actor) redirect('/login?to=/desk')
  if (!may(actor.roles, 'desk.see')) redirect('/field')
  const shop = await readDeskShop(actor.shopId)
  return (
    <DeskProvider actor={actor} shop={shop}>
      <DeskHeader />
      {children}
      <LiveRegion />
    </DeskProvider>
  )
}
