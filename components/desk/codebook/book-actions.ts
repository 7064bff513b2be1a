import type { Finding } from '@/lib/model/book-desk'
import type { WithdrawForm } from '@/lib/model/book-withdrawal'
import type { Result } from '@/lib/model/result'

/** Why something about the code book was not done; `findings` are of the checker. */
export type BookProblem =
  | {
      kind:
        | 'signIn'
        | 'invalid'
        | 'forbidden'
        | 'noDraft'
        | 'overtaken'
        | 'notFound'
        | 'noLimit'
        | 'withdrawnBefore'
        | 'noneBefore'
        | 'trouble'
    }
  | { kind: 'nothingNew'; version: number }
  | { kind: 'findings'; findings: Finding[] }

/** The server actions of the page; it hands them in. */
export type BookActions = {
  publish: (form: Record<never, never>) => Promise<Result<{ version: number }, BookProblem>>
  drop: (form: Record<never, never>) => Promise<Result<null, BookProblem>>
  withdraw: (
    form: WithdrawForm,
  ) => Promise<Result<{ id: string; published: { version: number } | null }, BookProblem>>
}

/** The sentence for what was not done. */
export function bookSentence(problem: BookProblem): string {
  switch (problem.kind) {
    case 'signIn':
      return 'You are signed out. Sign in again, then press once more.'
    case 'forbidden':
      return 'Your roles do not include this. Nothing was changed.'
    case 'invalid':
      return 'Say why in a few words. Nothing was changed.'
    case 'noDraft':
      return 'There is no draft any more. Nothing was changed.'
    case 'overtaken':
      return 'Another draft came meanwhile. Look at it, then publish.'
    case 'nothingNew':
      return `The draft is the same as version ${problem.version}. There is nothing to publish.`
    case 'findings':
      return `Not published: ${problem.findings.length} findings. Put the book right, take it in again, then publish.`
    case 'notFound':
      return 'The newest code book has nothing of that id. Nothing was changed.'
    case 'noLimit':
      return 'That check has no limit of the code book’s own. Limits of a spec sheet stand on the model.'
    case 'withdrawnBefore':
      return 'That was withdrawn before. Nothing was changed.'
    case 'noneBefore':
      return 'There is no earlier version to go back to. Publish a right one, then withdraw this one.'
    case 'trouble':
      return 'No answer from the shop, so it is not sure whether it was done. Look again in a moment.'
  }
}
