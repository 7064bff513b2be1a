import type { CodeBookItem } from './code-book'

/**
 * A version of the code book is never changed, and a job may hold one from before a field was added to the shapes.
 * Whoever works with it reads what an item without the field meant.
 */
const GAINED: Partial<Record<CodeBookItem['kind'], Readonly<Record<string, unknown>>>> = {
  symptom: { opens: 'suspects', engine: 'runs', cautions: [], firstLook: [] },
  spn: { tells: null },
  pcode: { tells: null },
  failure: { doesNotProve: 'It names a circuit, not a part.' },
}

/** The item with the fields its kind has gained since it was published; what it says itself stands. */
export const inShape = <T extends CodeBookItem>(item: T): T => ({ ...GAINED[item.kind], ...item })
