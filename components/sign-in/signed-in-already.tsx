'use client'

import { useEffect, useState } from 'react'
import { KeyLink } from '@/components/ui/key'
import type { Actor } from '@/lib/model/person'
import { browserShopLine } from '@/lib/ports/shop-line'
import { homeOf } from './home-of'
import { readActor } from './read-actor'
import { SignOutKey } from './sign-out-key'

/** Says who is signed in on this browser, with the ways on: go on, or sign out first. */
export function SignedInAlready() {
  const [who, setWho] = useState<Actor | null>(null)
  useEffect(() => {
    let open = true
    readActor(browserShopLine).then(
      (found) => open && setWho(found),
      () => open && setWho(null),
    )
    return () => {
      open = false
    }
  }, [])
  if (!who) return null
  const home = homeOf(who.roles)
  return (
    <section aria-label="Signed in" className="grid gap-3 border-2 border-ink p-3">
      <p>
        <strong>{who.name ?? 'A person without a name'}</strong> is signed in on this browser.
      </p>
      <div className="grid gap-2 min-[360px]:grid-cols-2">
        <KeyLink small={true} kind="plate" href={home}>
          {home === '/field' ? 'To the field' : 'To the desk'}
        </KeyLink>
        <SignOutKey small={true} after={() => setWho(null)} />
      </div>
    </section>
  )
}
