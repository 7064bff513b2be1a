import type { SignInProblem } from '@/lib/ports/shop-line'

const SENTENCES: Record<SignInProblem['kind'], string> = {
  wrong: 'E-mail or password is not right. Check both and try again.',
  locked: 'Too many wrong tries. Wait 15 minutes, then try again.',
  noConnection:
    'No connection to the shop. Signing in needs it. Only a phone where you did not sign out opens the field without.',
  serverTrouble: 'The shop’s server did not answer as it should. Try again in a moment.',
}

/** The sentence for a refused or failed sign-in. */
export const signInSentence = (problem: SignInProblem): string => SENTENCES[problem.kind]
