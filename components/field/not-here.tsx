import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'

/** A job that this phone does not hold, or no longer. */
export function NotHere() {
  return (
    <Screen
      title="Not on this phone"
      foot={
        <KeyLink kind="main" href="/field">
          Jobs on this phone
        </KeyLink>
      }
    >
      <p>
        This job is not on this phone. If the shop has it and it is yours or open, it arrives at the
        next contact.
      </p>
    </Screen>
  )
}
