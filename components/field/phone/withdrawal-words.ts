import type { Leading, VerdictChange } from '@/lib/diag/withdrawn'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'

/** What was withdrawn, as the head of its notice. */
export function withdrawnHead({ what, name }: Pick<BookWithdrawal, 'what' | 'name'>): string {
  switch (what) {
    case 'check':
      return `Do not do this check any more: ${name}.`
    case 'swap':
      return `Do not do this swap any more: ${name}.`
    case 'fault':
      return `This fault is withdrawn from the code book: ${name}.`
    case 'limit':
      return `The code book’s limit for this check is withdrawn: ${name}.`
    case 'version':
      return `${name} of the code book is withdrawn. Jobs go on with another one.`
  }
}

/** "Plug wet with fuel, 71 of 100; now Plug worn, 56 of 100." */
export const changeWords = ({ before, after }: VerdictChange): string =>
  `Was: ${leadingWords(before)}. Now: ${leadingWords(after)}.`

const leadingWords = (leading: Leading | null): string =>
  leading === null ? 'no suspect' : `${leading.name}, ${leading.of100} of 100`
