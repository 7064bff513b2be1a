import { Caution } from '@/components/ui/caution'
import { KeyLink } from '@/components/ui/key'
import { RuleEdge } from '@/components/ui/rule-edge'
import { WitnessMark } from '@/components/ui/witness-mark'

/** The front door: what it is, and the ways in. */
export default function FrontPage() {
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-column content-start gap-6 py-6">
      <div className="flex items-center gap-4">
        <WitnessMark state="whole" count={0} />
        <h1 className="caps text-hero">Farbench</h1>
      </div>
      <p className="text-row">
        A workbench that goes as far as the machine does: find the fault of a stranded machine with
        what is in the bag, prove the repair or get it out, and leave a record the shop can act on.
      </p>
      <RuleEdge>Where you work</RuleEdge>
      <nav aria-label="Ways in" className="grid gap-3">
        <KeyLink kind="main" href="/field">
          In the field
        </KeyLink>
        <KeyLink href="/desk">At the desk</KeyLink>
        <KeyLink href="/login">Sign in</KeyLink>
      </nav>
      <p className="text-second text-ink2">
        The field works without signal once this phone has opened it with signal and signed in.
      </p>
      <Caution signal="NOTICE">
        The maker’s manual, local rules and licensed practice come first. Chances shown are the
        model’s own. Farbench is not an emergency service.
      </Caution>
    </main>
  )
}
