import { AppError } from '@/lib/model/result'

/** Sentences for what can go wrong at the desk, keyed by kind. */
const READ: Record<string, string> = {
  noConnection: 'No connection to the shop. What is shown is what was last heard.',
  signedOut: 'You are signed out. Sign in again to go on.',
  forbidden: 'Your roles do not include this.',
  notFound: 'There is no such job in this shop.',
  serverTrouble: 'The shop’s server did not answer as it should. Trying again.',
}

/** The sentence for a failed read. */
export function readSentence(error: Error): string {
  const kind = error instanceof AppError ? error.kind : 'serverTrouble'
  return READ[kind] ?? 'The answer of the shop’s server could not be read. Load the page again.'
}
