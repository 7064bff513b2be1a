/**
 * The code book as CSV (RFC 4180), one file for each kind of record. A column is a field: text stands as it is,
 * an empty cell is null where a field may be null, everything else is JSON. `place` is the record's place in the
 * whole book; without one it goes to the end. csv-parse and csv-stringify do the quoting.
 */
import { CsvError, parse } from 'csv-parse/sync'
import { stringify } from 'csv-stringify/sync'
import type * as z from 'zod/mini'
import {
  type CodeBookItem,
  checkItem,
  codeBookItem,
  faultItem,
  featureItem,
  swapItem,
  symptomItem,
} from '@/lib/model/code-book'
import { failureItem, pcodeItem, setupItem, spnItem, wordItem } from '@/lib/model/code-table'
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
import { type Unseparated, unseparatedPair } from './unseparated'

type Kind = CodeBookItem['kind']
type Shape = Readonly<Record<string, z.core.$ZodType>>

const SHAPES: Readonly<Record<Kind, Shape>> = {
  feature: featureItem.shape,
  part: wordItem.shape,
  tool: wordItem.shape,
  system: wordItem.shape,
  circuit: wordItem.shape,
  setup: setupItem.shape,
  symptom: symptomItem.shape,
  fault: faultItem.shape,
  check: checkItem.shape,
  swap: swapItem.shape,
  failure: failureItem.shape,
  spn: spnItem.shape,
  pcode: pcodeItem.shape,
}
/** The kinds of records, each with a file of its own. */
export const CSV_KINDS = Object.keys(SHAPES) as Kind[]
const PAIRS_FILE = 'unseparated.csv'

/** What a cell of a column is: text as it is, or JSON; `nullable`: empty means null. */
type Column = { name: string; isText: boolean; nullable: boolean }

const columnsOf = (kind: Kind): Column[] =>
  Object.entries(SHAPES[kind])
    .filter(([name]) => name !== 'kind')
    .map(([name, type]) => columnOf(name, type))

function columnOf(name: string, type: z.core.$ZodType): Column {
  const { def } = (type as z.core.$ZodTypes)._zod
  if (def.type === 'nullable') return { ...columnOf(name, def.innerType), nullable: true }
  const isText = def.type === 'string' || def.type === 'enum'
  return { name, isText, nullable: false }
}

/** The files by name. Each has its header, also when the book has no record of the kind. */
export function writeBookCsv(book: BookFile): Map<string, string> {
  const placed = book.items.map((item, n) => ({ item, place: n + 1 }))
  const files = CSV_KINDS.map((kind): [string, string] => {
    const columns = columnsOf(kind)
    const rows = placed
      .filter(({ item }) => item.kind === kind)
      .map(({ item, place }) => [String(place), ...columns.map((column) => cellOf(item, column))])
    return [`${kind}.csv`, written([['place', ...columns.map(({ name }) => name)], ...rows])]
  })
  const pairs = book.unseparated.map(({ faults, reason }) => [...faults, reason])
  return new Map([...files, [PAIRS_FILE, written([['faultA', 'faultB', 'reason'], ...pairs])]])
}

const written = (rows: string[][]): string => stringify(rows, { quoted_match: /[\r\n]/ })

function cellOf(item: CodeBookItem, { name, isText, nullable }: Column): string {
  const value: unknown = Object.entries(item).find(([key]) => key === name)?.[1]
  if (value === null && nullable) return ''
  return isText ? String(value) : JSON.stringify(value)
}

/** The book in files by name, or everything that is wrong with them. A kind without a file has no records. */
export function readBookCsv(files: ReadonlyMap<string, string>): Result<ReadBook, FileProblem[]> {
  const problems = [...files.keys()].filter(isStrange).map(strangeFile)
  const rows: Row[] = []
  for (const kind of CSV_KINDS) {
    const read = readKind(kind, files.get(`${kind}.csv`))
    rows.push(...read.rows)
    problems.push(...read.problems)
  }
  const pairs = readPairs(files.get(PAIRS_FILE))
  problems.push(...pairs.problems)
  if (problems.length > 0) return fail(problems)
  const inOrder = rows.toSorted((a, b) => a.place - b.place)
  const items = inOrder.map(({ item }) => item)
  const places = inOrder.map(({ at }) => at)
  const twice = twiceProblems(items, places)
  if (twice.length > 0) return fail(twice)
  return ok({ book: { items, unseparated: pairs.pairs }, places: placesById(items, places) })
}

type Row = { item: CodeBookItem; place: number; at: FilePlace }

const isStrange = (name: string): boolean =>
  name !== PAIRS_FILE && !CSV_KINDS.some((kind) => name === `${kind}.csv`)

const strangeFile = (file: string): FileProblem => ({
  file,
  line: 1,
  column: 1,
  words: `No kind of record has a file of this name. There are ${CSV_KINDS.join(', ')}, unseparated.`,
})

type Line = { cells: string[]; line: number }

/** The lines of a file with where each begins; a cell may hold line feeds. */
function linesOf(file: string, text: string): Result<Line[], FileProblem[]> {
  const begins: number[] = []
  try {
    const records = parse(text, {
      bom: true,
      relax_column_count: true,
      record_delimiter: ['\r\n', '\n', '\r'],
      skip_empty_lines: true,
      on_record: (record: string[], { lines }) => {
        begins.push(lines - feedsIn(record))
        return record
      },
    })
    return ok(records.map((cells, n) => ({ cells, line: begins[n] ?? 1 })))
  } catch (cause) {
    if (!(cause instanceof CsvError)) throw cause
    const at = cause as CsvError & { lines?: number; column?: number | string }
    const column = typeof at.column === 'number' ? at.column + 1 : 1
    const words = `The file is not CSV here: ${cause.code === 'CSV_QUOTE_NOT_CLOSED' ? 'a quote is not closed.' : 'a quote stands where none may.'}`
    return fail([{ file, line: at.lines ?? 1, column, words }])
  }
}

const feedsIn = (record: string[]): number =>
  record.reduce((sum, cell) => sum + (cell.match(/\r\n|\n|\r/g)?.length ?? 0), 0)

function readKind(kind: Kind, text: string | undefined): { rows: Row[]; problems: FileProblem[] } {
  if (text === undefined) return { rows: [], problems: [] }
  const file = `${kind}.csv`
  const lines = linesOf(file, text)
  if (!lines.ok) return { rows: [], problems: lines.problem }
  const [header, ...rest] = lines.value
  const columns = columnsOf(kind)
  const wrong = headerProblem(file, header, ['place', ...columns.map(({ name }) => name)])
  if (header === undefined || wrong !== null) return { rows: [], problems: wrong ? [wrong] : [] }
  const rows: Row[] = []
  const problems: FileProblem[] = []
  for (const line of rest) {
    const read = readRow(line, { kind, file, names: header.cells, columns })
    if (read.ok) rows.push(read.value)
    else problems.push(...read.problem)
  }
  return { rows, problems }
}

function headerProblem(
  file: string,
  header: Line | undefined,
  wanted: readonly string[],
): FileProblem | null {
  const names = header?.cells ?? []
  const missing = wanted.filter((name) => name !== 'place' && !names.includes(name))
  const at = { file, line: header?.line ?? 1 }
  if (missing.length > 0)
    return { ...at, column: 1, words: `The first line lacks the column “${missing.join('”, “')}”.` }
  const odd = names.findIndex((name, n) => !wanted.includes(name) || names.indexOf(name) !== n)
  if (odd === -1) return null
  return { ...at, column: odd + 1, words: `“${names[odd] ?? ''}” is no column, or stands twice.` }
}

type Sheet = { kind: Kind; file: string; names: readonly string[]; columns: readonly Column[] }

function readRow({ cells, line }: Line, sheet: Sheet): Result<Row, FileProblem[]> {
  const { kind, file, names, columns } = sheet
  const place = (name: string): FilePlace => ({ file, line, column: names.indexOf(name) + 1 })
  if (cells.length !== names.length) {
    const words = `This line has ${cells.length} cells, the first line ${names.length}.`
    return fail([{ file, line, column: Math.min(cells.length, names.length), words }])
  }
  const problems: FileProblem[] = []
  const record: Record<string, unknown> = { kind }
  for (const column of columns) {
    const value = cellValue(cells[names.indexOf(column.name)] ?? '', column)
    if (value.ok) record[column.name] = value.value
    else problems.push({ ...place(column.name), words: `“${column.name}” ${value.problem}` })
  }
  const order = cells[names.indexOf('place')] ?? ''
  if (!/^\d{0,9}$/.test(order))
    problems.push({ ...place('place'), words: '“place” must be a whole number, or empty.' })
  if (problems.length > 0) return fail(problems)
  const parsed = codeBookItem.safeParse(record)
  if (parsed.success) {
    const at = { file, line, column: 1 }
    return ok({ item: parsed.data, place: order === '' ? Infinity : Number(order), at })
  }
  return fail(
    parsed.error.issues.map((issue) => ({
      ...place(String(issue.path[0] ?? 'id')),
      words: issueWords(issue, `“${issue.path.map(String).join('.')}”`),
    })),
  )
}

function cellValue(cell: string, { isText, nullable }: Column): Result<unknown, string> {
  if (cell === '' && nullable) return ok(null)
  if (isText) return ok(cell)
  // Spreadsheets write these two in capitals.
  const text = /^(true|false)$/i.test(cell) ? cell.toLowerCase() : cell
  try {
    return ok(JSON.parse(text))
  } catch {
    return fail(cell === '' ? 'must not be empty.' : 'is not written as JSON writes it.')
  }
}

function readPairs(text: string | undefined): { pairs: Unseparated[]; problems: FileProblem[] } {
  if (text === undefined) return { pairs: [], problems: [] }
  const lines = linesOf(PAIRS_FILE, text)
  if (!lines.ok) return { pairs: [], problems: lines.problem }
  const problems: FileProblem[] = []
  const pairs = lines.value.slice(1).flatMap(({ cells, line }) => {
    const [a, b, reason] = cells
    const parsed = unseparatedPair.safeParse({ faults: [a, b], reason })
    if (parsed.success) return [parsed.data]
    const words = 'This is no pair of faults with a reason.'
    problems.push({ file: PAIRS_FILE, line, column: 1, words })
    return []
  })
  return { pairs, problems }
}
