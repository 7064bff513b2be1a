import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { canonicalText } from '@/db/chain'
import { BOOK_ITEMS, UNSEPARATED } from '@/db/codebook/book'
import { CSV_KINDS, readBookCsv, writeBookCsv } from '@/db/codebook/file-csv'
import { readBookJson, writeBookJson } from '@/db/codebook/file-json'
import { type BookFile, problemLine } from '@/db/codebook/file-problem'
import { codeBookItem } from '@/lib/model/code-book'
import { anyBook } from './any-book'

const RUNS = { seed: 20261203, numRuns: 120 }
const JSON_HEAD = { version: 3, hash: 'a'.repeat(64) }
const shipped: BookFile = {
  items: BOOK_ITEMS.filter((item) => codeBookItem.safeParse(item).success),
  unseparated: [...UNSEPARATED],
}
/** Order and every field, told by canonical JSON, in which -0 is 0 as in every file. */
const exact = (book: BookFile) => canonicalText(book)

describe('[CB30] a code book comes back from a file as it was', () => {
  test('the whole shipped book, as JSON', () => {
    const read = readBookJson(writeBookJson(shipped, JSON_HEAD), 'book.json')
    expect(read.ok && exact(read.value.book)).toBe(exact(shipped))
    expect(shipped.items.length).toBeGreaterThan(200)
  })

  test('the whole shipped book, as CSV', () => {
    const read = readBookCsv(writeBookCsv(shipped))
    expect(read.ok && exact(read.value.book)).toBe(exact(shipped))
  })

  test('any book, whatever its texts and figures, as JSON and as CSV', () => {
    fc.assert(
      fc.property(anyBook, (book) => {
        const json = readBookJson(writeBookJson(book, JSON_HEAD), 'book.json')
        const csv = readBookCsv(writeBookCsv(book))
        expect(json.ok && exact(json.value.book)).toBe(exact(book))
        expect(csv.ok && exact(csv.value.book)).toBe(exact(book))
      }),
      RUNS,
    )
  })

  test('a file for each kind, also of a kind that is not in the book, and one for the pairs', () => {
    const files = writeBookCsv({ items: [], unseparated: [] })
    expect([...files.keys()]).toEqual([
      ...CSV_KINDS.map((kind) => `${kind}.csv`),
      'unseparated.csv',
    ])
    const read = readBookCsv(files)
    expect(read.ok && read.value.book).toEqual({ items: [], unseparated: [] })
  })
})

const linesOf = (read: ReturnType<typeof readBookCsv>) =>
  read.ok ? [] : read.problem.map(problemLine)

describe('[CB31] what is wrong with a CSV file is said by line and column', () => {
  const setups = (...lines: string[]) =>
    new Map([
      ['setup.csv', ['place,id,name,minutes,requires,closedByTest,source', ...lines].join('\n')],
    ])

  test.each([
    [
      'a cell that is no number',
      '1,seat,Seat off,two,[],false,from memory',
      4,
      '“minutes” is not written as JSON writes it.',
    ],
    [
      'a text where a number belongs',
      '1,seat,Seat off,"""2""",[],false,from memory',
      4,
      '“minutes” must be a number.',
    ],
    ['an empty cell', '1,seat,Seat off,2,,false,from memory', 5, '“requires” must not be empty.'],
    [
      'an id that is none',
      '1,Seat!,Seat off,2,[],false,from memory',
      2,
      '“id” is not written as it must be.',
    ],
    [
      'a place that is none',
      'x,seat,Seat off,2,[],false,from memory',
      1,
      '“place” must be a whole number, or empty.',
    ],
    ['a cell too few', '1,seat,Seat off,2,[],false', 6, 'This line has 6 cells, the first line 7.'],
  ])('%s', (_what, line, column, words) => {
    const good = '2,cover,"Cover\noff",1,[],FALSE,from memory'
    expect(linesOf(readBookCsv(setups(good, line)))).toEqual([
      `setup.csv, line 4, column ${column}: ${words}`,
    ])
  })

  test('a quote that is not closed, a column that is missing, a file of no kind, an item twice', () => {
    expect(linesOf(readBookCsv(setups('1,seat,"Seat off')))).toEqual([
      'setup.csv, line 2, column 3: The file is not CSV here: a quote is not closed.',
    ])
    expect(linesOf(readBookCsv(new Map([['setup.csv', 'place,id,name\n']])))).toEqual([
      'setup.csv, line 1, column 1: The first line lacks the column “minutes”, “requires”, “closedByTest”, “source”.',
    ])
    expect(linesOf(readBookCsv(new Map([['jobs.csv', '']])))[0]).toMatch(/^jobs\.csv, line 1/)
    const seat = 'seat,Seat off,2,[],false,from memory'
    expect(linesOf(readBookCsv(setups(`1,${seat}`, `2,${seat}`)))).toEqual([
      'setup.csv, line 3, column 1: The setup “seat” stands here a second time.',
    ])
  })

  test('lines without a place go to the end, in their order', () => {
    const read = readBookCsv(
      setups(
        ',b,Bb,2,[],false,from memory',
        ',c,Cc,2,[],false,from memory',
        '1,a,Aa,2,[],true,from memory',
      ),
    )
    expect(read.ok && read.value.book.items.map(({ id }) => id)).toEqual(['a', 'b', 'c'])
  })
})

describe('[CB31] what is wrong with a JSON file is said by line and column', () => {
  const two: BookFile = {
    items: shipped.items.filter(({ kind }) => kind === 'setup').slice(0, 2),
    unseparated: [],
  }
  const text = writeBookJson(two, JSON_HEAD)
  const told = (changed: string) => {
    const read = readBookJson(changed, 'book.json')
    return read.ok ? [] : read.problem.map(problemLine)
  }
  const lineOf = (part: string) => text.slice(0, text.indexOf(part)).split('\n').length

  test('a figure of the wrong kind, at the figure itself', () => {
    const line = lineOf('"minutes"')
    const id = two.items[0]?.id ?? ''
    expect(told(text.replace(/"minutes": [\d.]+/, '"minutes": "two"'))).toEqual([
      `book.json, line ${line}, column 18: setup “${id}”, “minutes” must be a number.`,
    ])
  })

  test('a comma too many or too few, a file that is cut, and one that is something else', () => {
    expect(told(text.replace('"minutes"', ',"minutes"'))[0]).toMatch(
      new RegExp(`^book\\.json, line ${lineOf('"minutes"')}, column \\d+: The file is not JSON: `),
    )
    expect(told(text.slice(0, 90)).length).toBeGreaterThan(0)
    expect(told('[]')).toEqual([
      'book.json, line 1, column 1: The file must hold one record with “items”.',
    ])
    expect(told('{"farbenchCodeBook": 9}')[0]).toContain('it is no file of a code book')
  })

  test('a name twice in one record, and a record twice in the book', () => {
    expect(told(text.replace('"minutes"', '"name": "Again",\n      "minutes"'))).toEqual([
      `book.json, line ${lineOf('"minutes"')}, column 7: “name” stands twice in one record.`,
    ])
    const [first] = two.items
    const doubled = writeBookJson(
      { items: first ? [first, first] : [], unseparated: [] },
      JSON_HEAD,
    )
    expect(told(doubled)[0]).toContain('stands here a second time.')
  })
})
