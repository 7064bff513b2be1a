import type * as z from 'zod/mini'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { Unseparated } from './unseparated'

/** What a file of the code book holds: the items in their order, and the pairs left together. */
export type BookFile = { items: CodeBookItem[]; unseparated: Unseparated[] }

/** A place in a file of the code book; line and column from 1. */
export type FilePlace = { file: string; line: number; column: number }

/** What is wrong with a file, and where, in a plain sentence. */
export type FileProblem = FilePlace & { words: string }

/** A file that was read, with where each item stands, so that findings of the checker can be placed. */
export type ReadBook = { book: BookFile; places: ReadonlyMap<string, FilePlace> }

/** Says what a shape misses in a plain sentence; `where` is what it is about, e.g. `“minutes”`. */
export function issueWords(issue: z.core.$ZodIssue, where: string): string {
  switch (issue.code) {
    case 'invalid_type':
      return `${where} must be ${article(issue.expected)}.`
    case 'unrecognized_keys':
      return `${where} has a field the code book does not know: ${listed(issue.keys)}.`
    case 'invalid_value':
      return `${where} must be one of ${listed(issue.values)}.`
    case 'too_small':
      return `${where} is too short or too small: at least ${issue.minimum}.`
    case 'too_big':
      return `${where} is too long or too big: at most ${issue.maximum}.`
    case 'invalid_format':
      return `${where} is not written as it must be.`
    case 'invalid_union':
      return `${where} is none of what it may be.`
    case 'invalid_key':
      return `${where} has a name in it that is not allowed.`
    case 'invalid_element':
    case 'not_multiple_of':
    case 'custom':
      return `${where} is not right.`
  }
}

const article = (type: string): string => `${/^[aeiou]/.test(type) ? 'an' : 'a'} ${type}`

const listed = (values: readonly unknown[]): string =>
  values.map((value) => `“${String(value)}”`).join(', ')

/** The problem as one line: `check.csv, line 12, column 3: “minutes” must be a number.` */
export const problemLine = ({ file, line, column, words }: FileProblem): string =>
  `${file}, line ${line}, column ${column}: ${words}`

/** Items that stand twice, told at the second place. */
export function twiceProblems(
  items: readonly CodeBookItem[],
  places: readonly FilePlace[],
): FileProblem[] {
  const seen = new Set<string>()
  return items.flatMap((item, n) => {
    const key = `${item.kind}:${item.id}`
    const place = places[n]
    const isTwice = seen.has(key)
    seen.add(key)
    if (!isTwice || place === undefined) return []
    return [{ ...place, words: `The ${item.kind} “${item.id}” stands here a second time.` }]
  })
}

/** Where each item stands, by its id. */
export function placesById(
  items: readonly CodeBookItem[],
  places: readonly FilePlace[],
): Map<string, FilePlace> {
  const byId = new Map<string, FilePlace>()
  for (const [n, { id }] of items.entries()) {
    const place = places[n]
    if (place !== undefined) byId.set(id, place)
  }
  return byId
}
