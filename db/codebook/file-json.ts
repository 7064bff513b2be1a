/**
 * The code book as one JSON file. Reading says where what is wrong, by line and column: the text is parsed
 * twice, once for its values and once (jsonc-parser) for the places of them. Numbers, words and order come back
 * exactly; what a person added as spaces does not.
 */
import { findNodeAtLocation, type Node, type ParseError, parseTree } from 'jsonc-parser'
import { codeBookItem } from '@/lib/model/code-book'
import { fail, ok, type Result } from '@/lib/model/result'
import {
  type BookFile,
  type FilePlace,
  type FileProblem,
  issueWords,
  placesById,
  type ReadBook,
  twiceProblems,
} from './file-problem'
import { unseparatedPair } from './unseparated'

/** Version of the file's own form. */
const FORM = 1

/** The file's text: one field on each line, two spaces deep, in the order of the book. */
export function writeBookJson(
  book: BookFile,
  of: { version: number | null; hash: string },
): string {
  const { items, unseparated } = book
  return `${JSON.stringify({ farbenchCodeBook: FORM, ...of, unseparated, items }, null, 2)}\n`
}

/** The book in a file, or everything that is wrong with it; `file` is the name said with each problem. */
export function readBookJson(text: string, file: string): Result<ReadBook, FileProblem[]> {
  const at = placer(text, file)
  const errors: ParseError[] = []
  const root = parseTree(text, errors, { disallowComments: true, allowTrailingComma: false })
  if (errors.length > 0 || root === undefined) return fail(errors.map((error) => syntax(error, at)))
  const twice = keysTwice(root, at)
  if (twice.length > 0) return fail(twice)
  return readRoot(root, { text, at })
}

type Placer = (offset: number) => FilePlace
type Reading = { text: string; at: Placer }

/** Answers places by their offset; lines end where the text has a line feed. */
function placer(text: string, file: string): Placer {
  const starts = [0]
  for (let from = text.indexOf('\n'); from !== -1; from = text.indexOf('\n', from + 1))
    starts.push(from + 1)
  return (offset) => {
    let low = 0
    let high = starts.length - 1
    while (low < high) {
      const middle = Math.ceil((low + high) / 2)
      if ((starts[middle] ?? 0) <= offset) low = middle
      else high = middle - 1
    }
    return { file, line: low + 1, column: offset - (starts[low] ?? 0) + 1 }
  }
}

const SYNTAX: Readonly<Record<number, string>> = {
  1: 'something stands here that JSON does not know.',
  2: 'this is no number as JSON writes it.',
  3: 'a name in double quotes is missing here.',
  4: 'a value is missing here.',
  5: 'a colon is missing here.',
  6: 'a comma is missing here.',
  7: 'a closing brace is missing here.',
  8: 'a closing bracket is missing here.',
  9: 'the file goes on after its end.',
  10: 'a comment stands here, which JSON does not have.',
  11: 'a comment is not ended.',
  12: 'a text is not ended.',
  13: 'a number is not ended.',
  14: 'a \\u in a text is not whole.',
  15: 'a text has a backslash before a letter that takes none.',
  16: 'a text holds a character that must be escaped.',
}

const syntax = ({ error, offset }: ParseError, at: Placer): FileProblem => ({
  ...at(offset),
  words: `The file is not JSON: ${SYNTAX[error] ?? 'it is not whole.'}`,
})

/** A name that stands twice in one object: the second would silently win. */
function keysTwice(node: Node, at: Placer): FileProblem[] {
  const inside = (node.children ?? []).flatMap((child) => keysTwice(child, at))
  if (node.type !== 'object') return inside
  const seen = new Set<unknown>()
  const here = (node.children ?? []).flatMap((property) => {
    const key = property.children?.[0]
    if (key === undefined || !seen.has(key.value)) {
      seen.add(key?.value)
      return []
    }
    return [{ ...at(key.offset), words: `“${String(key.value)}” stands twice in one record.` }]
  })
  return [...here, ...inside]
}

function readRoot(root: Node, { text, at }: Reading): Result<ReadBook, FileProblem[]> {
  const top = at(root.offset)
  const whole: unknown = JSON.parse(text)
  if (typeof whole !== 'object' || whole === null || Array.isArray(whole))
    return fail([{ ...top, words: 'The file must hold one record with “items”.' }])
  const { farbenchCodeBook, items, unseparated } = whole as Record<string, unknown>
  if (farbenchCodeBook !== FORM)
    return fail([
      { ...top, words: `“farbenchCodeBook” must be ${FORM}: it is no file of a code book.` },
    ])
  if (!Array.isArray(items)) return fail([{ ...top, words: '“items” must be a list.' }])
  const placeOf = (path: readonly PropertyKey[]): FilePlace => at(deepest(root, path).offset)
  return readParts({ items, unseparated: Array.isArray(unseparated) ? unseparated : [] }, placeOf)
}

type PlaceOf = (path: readonly PropertyKey[]) => FilePlace

function readParts(
  of: { items: unknown[]; unseparated: unknown[] },
  placeOf: PlaceOf,
): Result<ReadBook, FileProblem[]> {
  const problems: FileProblem[] = []
  const items = of.items.flatMap((item, n) => {
    const parsed = codeBookItem.safeParse(item)
    if (parsed.success) return [parsed.data]
    for (const issue of parsed.error.issues)
      problems.push({
        ...placeOf(['items', n, ...issue.path]),
        words: issueWords(issue, named(item, issue.path)),
      })
    return []
  })
  const unseparated = of.unseparated.flatMap((pair, n) => {
    const parsed = unseparatedPair.safeParse(pair)
    if (parsed.success) return [parsed.data]
    const words = 'This is no pair of faults with a reason.'
    problems.push({ ...placeOf(['unseparated', n]), words })
    return []
  })
  if (problems.length > 0) return fail(problems)
  const places = items.map((_, n) => placeOf(['items', n]))
  const twice = twiceProblems(items, places)
  if (twice.length > 0) return fail(twice)
  return ok({ book: { items, unseparated }, places: placesById(items, places) })
}

/** The node at a path, or the last one on the way to it that is there. */
function deepest(root: Node, path: readonly PropertyKey[]): Node {
  for (let length = path.length; length > 0; length--) {
    const steps = path.slice(0, length).map((step) => (typeof step === 'symbol' ? '' : step))
    const node = findNodeAtLocation(root, steps)
    if (node !== undefined) return node
  }
  return root
}

/** `check “coilOhms”, “minutes”`: what an issue is about. */
function named(item: unknown, path: readonly PropertyKey[]): string {
  const { kind, id } = (typeof item === 'object' && item !== null ? item : {}) as {
    kind?: unknown
    id?: unknown
  }
  const record = typeof id === 'string' ? `${String(kind)} “${id}”` : 'The record'
  return path.length === 0 ? record : `${record}, “${path.map(String).join('.')}”`
}
