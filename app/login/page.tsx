import type { Metadata } from 'next'
import { EmptiedNotice } from '@/components/sign-in/emptied-notice'
import { SignInForm } from '@/components/sign-in/sign-in-form'
import { SignedInAlready } from '@/components/sign-in/signed-in-already'
import { RuleEdge } from '@/components/ui/rule-edge'
import { WitnessMark } from '@/components/ui/witness-mark'

export const dynamic = 'force-static'
export const metadata: Metadata = { title: 'Sign in' }

/** The door to the field and the desk. Static, so that it carries hashes and no nonce. */
export default function SignInPage() {
  return (
    <main className="safe-sides mx-auto grid min-h-dvh max-w-[30rem] content-start gap-6 py-6">
      <a href="/" className="flex items-center gap-4 text-ink no-underline">
        <WitnessMark state="whole" count={0} />
        <span className="caps text-plate">Farbench</span>
      </a>
      <h1 className="visually-hidden">Sign in to Farbench</h1>
      <RuleEdge>Sign in</RuleEdge>
      <EmptiedNotice />
      <SignedInAlready />
      <SignInForm />
      <p className="text-second text-ink2">
        A phone where nobody signed out opens <a href="/field">the field</a> without signal and
        without signing in again. No password is kept on it.
      </p>
    </main>
  )
}
