import { readBookCsv } from '@/db/codebook/file-csv'
import { readBookJson } from '@/db/codebook/file-json'
import type { FilePlace, FileProblem, ReadBook } from '@/db/codebook/file-problem'
import type { BookImport, BookImported } from '@/lib/model/book-desk'
import { fail, ok, type Result } from '@/lib/model/result'
import { type BookHand, takeDraft } from './take-draft'

/**
 * Takes files as the shop's draft: one JSON file, or CSV files by name. What is wrong with the files, and what the
 * checker finds in the book, is told by file, line and column; only the first hinders the draft.
 */
export async function importBook(
  hand: BookHand,
  { files, note, replace }: BookImport,
): Promise<Result<BookImported, { kind: 'forbidden' | 'hasDraft' }>> {
  const read = readFiles(files)
  if (!read.ok) return ok({ taken: null, problems: read.problem, findings: [] })
  const { book, places } = read.value
  const taken = await takeDraft(hand, { book, note, replace })
  if (!taken.ok) return fail(taken.problem)
  const { findings, ...draft } = taken.value
  const placed = findings.map((one) => ({ ...one, place: places.get(one.id) ?? null }))
  return ok({ taken: draft, problems: [], findings: placed })
}

const START: FilePlace = { file: '', line: 1, column: 1 }

function readFiles(files: BookImport['files']): Result<ReadBook, FileProblem[]> {
  const [first] = files
  if (first === undefined) return fail([{ ...START, words: 'No file was chosen.' }])
  const json = files.find(({ name }) => name.endsWith('.json'))
  if (json === undefined) return readBookCsv(new Map(files.map(({ name, text }) => [name, text])))
  if (files.length > 1) {
    const words = 'Choose one JSON file, or CSV files alone.'
    return fail([{ ...START, file: json.name, words }])
  }
  return readBookJson(json.text, json.name)
}
