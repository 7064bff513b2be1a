import type { BookIndex } from './book-index'

const KINDS = ['symptoms', 'faults', 'checks', 'swaps'] as const
export type ChangedKind = (typeof KINDS)[number]
/** Names of what came, reads otherwise, or went, of one kind. */
export type BookChange = { kind: ChangedKind; added: string[]; changed: string[]; gone: string[] }

type Named = { name: string }

/**
 * What another version of the book says otherwise, as far as a job is worked out with it: complaints, faults,
 * checks and swaps, by their names. Kinds in which nothing changed are left out.
 */
export function bookChanges(before: BookIndex, after: BookIndex): BookChange[] {
  return KINDS.map((kind) => changesOf(kind, before[kind], after[kind])).filter(
    ({ added, changed, gone }) => added.length + changed.length + gone.length > 0,
  )
}

function changesOf(
  kind: ChangedKind,
  before: ReadonlyMap<string, Named>,
  after: ReadonlyMap<string, Named>,
): BookChange {
  const change: BookChange = { kind, added: [], changed: [], gone: [] }
  for (const [id, item] of after) {
    const was = before.get(id)
    if (was === undefined) change.added.push(item.name)
    else if (plain(was) !== plain(item)) change.changed.push(item.name)
  }
  for (const [id, { name }] of before) if (!after.has(id)) change.gone.push(name)
  return change
}

/** Two items that say the same are the same, in whatever order their fields stand. */
const plain = (value: unknown): string => JSON.stringify(value, sorted)

function sorted(_key: string, value: unknown): unknown {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return value
  return Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
}
