import { KeyLink } from '@/components/ui/key'
import { Screen } from '@/components/ui/screen'

const WORDS = {
  job: {
    title: 'Not on this phone',
    text: 'This job is not on this phone. If the shop has it and it is yours or open, it arrives at the next contact.',
  },
  screen: { title: 'Nothing here', text: 'There is no screen at this address.' },
}

/** A job that this phone does not hold, or no longer; or an address that no screen has. */
export function NotHere({ what }: { what: keyof typeof WORDS }) {
  return (
    <Screen
      title={WORDS[what].title}
      foot={
        <KeyLink kind="main" href="/field">
          Jobs on this phone
        </KeyLink>
      }
    >
      <p>{WORDS[what].text}</p>
    </Screen>
  )
}
