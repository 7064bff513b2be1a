import type { BookProblemKind } from '@/db/codebook/book-problem'
import { assemble } from '@/db/codebook/chapter'
import { DIES } from '@/db/codebook/chapter-dies'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { itemsOf } from '@/db/codebook/items'
import type { CodeBookItem } from '@/lib/model/code-book'

type Kind = CodeBookItem['kind']
type Of<K extends Kind> = Extract<CodeBookItem, { kind: K }>
export type Book = {
  items: CodeBookItem[]
  models: typeof DEMO_MODELS
  item: <K extends Kind>(kind: K, id: string) => Of<K>
}

const FIRST = itemsOf(assemble([DIES]))

/** The first chapter as a book, free to be broken. */
export function copyBook(): Book {
  const items = structuredClone(FIRST)
  return {
    items,
    models: structuredClone(DEMO_MODELS),
    item: <K extends Kind>(kind: K, id: string) => {
      const found = items.find((i) => i.kind === kind && i.id === id)
      if (found === undefined) throw new Error(`no ${kind} ${id}`)
      return found as Of<K>
    },
  }
}

/** The pieces of the failed coil's resistance. */
export const coilWeights = (book: Book) =>
  book.item('check', 'coilPrimaryResistance').reading?.byFault.ignitionCoilPart ?? []

/** One way to break a book: the finding it must make, and where. */
export type Break = [rule: string, kind: BookProblemKind, at: RegExp, breakIt: (book: Book) => void]
