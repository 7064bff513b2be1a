import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'

/** Nobody is at work on this phone: how to begin. */
export function SignedOut() {
  return (
    <Screen
      title="Nobody is signed in"
      foot={
        <KeyLink kind="main" href="/login">
          Sign in
        </KeyLink>
      }
    >
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
