/**
 * The gate a code book has to pass before it is published: one list of findings, empty when it is right.
 * Rules CB1 to CB24 of docs/spec/code-book.md. Shape comes first; the rest is only looked at when every
 * record has its shape, because a wrong shape makes the other findings noise.
 */
import type { CodeBookItem } from '@/lib/model/code-book'
import { type MachineModel, machineModel } from '@/lib/model/machine-model'
import { type BookProblem, type Books, shelve } from './book-problem'
import { checkAsked } from './check-asked'
import { checkCodes } from './check-codes'
import { checkIds } from './check-ids'
import { checkReach, checkShares } from './check-list'
import { checkOrphans, checkSources, shapeProblem } from './check-orphans'
import { checkSafety } from './check-safety'
import { checkFailures, checkReadings, checkTables } from './check-tables'
import { checkWords } from './check-words'
import { checkSameRows } from './same-rows'
import type { Unseparated } from './unseparated'

/**
 * Everything wrong with a book and the models it is published with, in the order of the rules; empty is right.
 * `unseparated` is the table of pairs left together with a reason.
 */
export function checkBook(
  items: readonly CodeBookItem[],
  models: readonly MachineModel[],
  unseparated: readonly Unseparated[] = [],
): BookProblem[] {
  const shapes = [...items.map(shapeProblem), ...models.map(modelShape)].filter((p) => p !== null)
  if (shapes.length > 0) return shapes
  const books: Books = { shelf: shelve(items), models }
  return [
    ...checkIds(books),
    ...checkSources(books),
    ...checkOrphans(books),
    ...checkTables(books),
    ...checkReadings(books),
    ...checkFailures(books),
    ...checkCodes(books),
    ...checkAsked(books),
    ...checkShares(books),
    ...checkReach(books, unseparated),
    ...checkSafety(books),
    ...checkWords(books),
    ...checkSameRows(books.shelf),
  ]
}

function modelShape(model: MachineModel): BookProblem | null {
  const parsed = machineModel.safeParse(model)
  if (parsed.success) return null
  const issue = parsed.error.issues[0]
  return {
    kind: 'shape',
    id: model.model,
    words: `${issue?.path.join('.') ?? ''}: ${issue?.message ?? 'wrong shape'}`,
  }
}
