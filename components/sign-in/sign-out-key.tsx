'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { browserShopLine } from '@/lib/ports/shop-line'

type Props = { small?: boolean; after?: () => void }

const toSignIn = () => window.location.assign('/login')

/**
 * Ends the session at the shop. Work kept on this device is not touched: it stays sealed for the same
 * person and goes up by the device's key.
 */
export function SignOutKey({ small = false, after = toSignIn }: Props) {
  const [state, setState] = useState<'ready' | 'busy' | 'failed'>('ready')
  async function press() {
    setState('busy')
    const answer = await browserShopLine.signOut()
    if (!answer.ok) return setState('failed')
    // Whoever opens the field on this browser next has to sign in; what is unsent there stays.
    const file = await import('@/lib/sync/client/emptied').catch(() => null)
    await file?.lockField().catch(() => undefined)
    setState('ready')
    after()
  }
  return (
    <span className="grid gap-1">
      <Key small={small} disabled={state === 'busy'} onClick={() => void press()}>
        Sign out
      </Key>
      <span role="status" className="text-second font-bold text-nogo">
        {state === 'failed' ? 'Not signed out: no answer from the shop. Try again.' : ''}
      </span>
    </span>
  )
}
