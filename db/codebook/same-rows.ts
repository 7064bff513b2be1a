import type { BookProblem, Shelf } from './book-problem'

/** A row that stands in more checks than this was copied, not thought of. */
const OFTEN = 5
/** Of 100 rows, how many may be such (the owner's bound). */
const MOST_OF_100 = 20

/** How many rows there are in the tables of checks and swaps, and how many stand in more than five of them. */
export function sameRows(shelf: Pick<Shelf, 'check' | 'swap'>): { rows: number; shared: number } {
  const rows = [...shelf.check, ...shelf.swap].flatMap(({ id, table }) =>
    Object.values(table).map((row) => ({ id, row: row.join(' ') })),
  )
  const checksOf = new Map<string, Set<string>>()
  for (const { id, row } of rows) checksOf.set(row, (checksOf.get(row) ?? new Set()).add(id))
  const shared = rows.filter(({ row }) => (checksOf.get(row)?.size ?? 0) > OFTEN)
  return { rows: rows.length, shared: shared.length }
}

/** [CB20] Too many rows that look alike. */
export function checkSameRows(shelf: Shelf): BookProblem[] {
  const { rows, shared } = sameRows(shelf)
  return shared * 100 > rows * MOST_OF_100
    ? [
        {
          kind: 'sameRows',
          id: 'tables',
          words: `${shared} of ${rows} rows stand in more than ${OFTEN} checks; at most ${MOST_OF_100} of 100`,
        },
      ]
    : []
}
