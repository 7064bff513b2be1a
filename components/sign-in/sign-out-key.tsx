'use client'

import { useState } from 'react'
import { Key } from '@/components/ui/key'
import { browserShopLine } from '@/lib/ports/shop-line'
import { type Ended, endHere, lockHere } from './end-here'

type Props = { small?: boolean; after?: () => void }

const toSignIn = () => window.location.assign('/login')

const TROUBLE: Record<Exclude<Ended, 'out'>, string> = {
  notSignedOut: 'Not signed out: no answer from the shop. Try again.',
  fieldOpen:
    'Signed out at the shop, but the field on this browser is still open: whoever uses it next can read its jobs. Close the field too.',
}

/**
 * Ends the session at the shop and closes the field on this browser. Work kept on this device is not
 * touched: it stays sealed for the same person and goes up by the device's key.
 */
export function SignOutKey({ small = false, after = toSignIn }: Props) {
  const [state, setState] = useState<'ready' | 'busy' | Ended>('ready')
  const end = () => endHere({ line: browserShopLine, lock: lockHere })
  const onlyLock = () =>
    lockHere().then(
      (): Ended => 'out',
      (): Ended => 'fieldOpen',
    )
  async function press(run: () => Promise<Ended>) {
    setState('busy')
    const ended = await run()
    setState(ended)
    if (ended === 'out') after()
  }
  return (
    <span className="grid gap-1">
      {state === 'fieldOpen' ? (
        <Key small={small} onClick={() => void press(onlyLock)}>
          Close the field
        </Key>
      ) : (
        <Key small={small} disabled={state === 'busy'} onClick={() => void press(end)}>
          Sign out
        </Key>
      )}
      <span role="status" className="text-second font-bold text-nogo">
        {state === 'notSignedOut' || state === 'fieldOpen' ? TROUBLE[state] : ''}
      </span>
    </span>
  )
}
