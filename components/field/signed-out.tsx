'use client'

import { EMPTIED_WORDS } from '@/components/sign-in/emptied-words'
import { useStoresHere } from '@/components/store/use-stores-here'
import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'

/** Nobody is at work on this phone: how to begin. */
export function SignedOut({ emptied }: { emptied: boolean }) {
  return <SignedOutWords emptied={emptied} held={useStoresHere()} />
}

/** `held`: somebody's store is on this phone; only then is anything said of work that is still here. */
export function SignedOutWords({ emptied, held }: { emptied: boolean; held: boolean }) {
  return (
    <Screen
      title="Nobody is signed in"
      foot={
        <KeyLink kind="main" href="/login">
          Sign in
        </KeyLink>
      }
    >
      {emptied ? <p className="border-2 border-ink px-3 py-2 font-bold">{EMPTIED_WORDS}</p> : null}
      <p>
        Sign in once where there is signal. After that the field opens without signal, with your
        jobs, the fleet and the code book.
      </p>
      {held ? (
        <p className="text-ink2">
          {emptied ? 'Somebody else’s work' : 'Work'} that was recorded on this phone and not sent
          is still here, locked. It opens again when its person signs in.
        </p>
      ) : null}
    </Screen>
  )
}
