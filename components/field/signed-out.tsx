import { EMPTIED_WORDS } from '@/components/sign-in/emptied-words'
import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'

/** Nobody is at work on this phone: how to begin. */
export function SignedOut({ emptied }: { emptied: boolean }) {
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
      <p className="text-ink2">
        Work that somebody recorded on this phone and did not send is still here. It opens again
        when they sign in.
      </p>
    </Screen>
  )
}
