import { asShop } from '@/db/client'
import { writeBookCsv } from '@/db/codebook/file-csv'
import { writeBookJson } from '@/db/codebook/file-json'
import type { BookFile } from '@/db/codebook/file-problem'
import { publishedBook, unseparatedOf } from '@/db/queries/code-book'
import type { Id } from '@/lib/model/id'
import { readDraft } from './take-draft'

/** A book to be written to a file; `version` null is the draft. */
export type Exported = { version: number | null; hash: string; book: BookFile }

/** The draft (`draft`), a version by its number, or the newest (null); undefined when there is none such. */
export async function exportBook(
  shopId: Id,
  which: number | 'draft' | null,
): Promise<Exported | undefined> {
  if (which === 'draft') {
    const draft = await readDraft(shopId)
    return draft && { version: null, ...draft }
  }
  return await asShop(shopId, async (tx) => {
    const found = await publishedBook(tx, which ?? undefined)
    if (found === undefined) return undefined
    const { version, hash, items } = found
    return { version, hash, book: { items, unseparated: await unseparatedOf(tx, version) } }
  })
}

/** The book as one file to be handed out: JSON (`kind` null), or the CSV of one kind; null for a kind that is none. */
export function exportedFile(
  { book, version, hash }: Exported,
  kind: string | null,
): { name: string; text: string; type: string } | null {
  if (kind === null) {
    const text = writeBookJson(book, { version, hash })
    const name = `codebook-${version ?? 'draft'}.json`
    return { name, text, type: 'application/json; charset=utf-8' }
  }
  const name = `${kind}.csv`
  const text = writeBookCsv(book).get(name)
  return text === undefined ? null : { name, text, type: 'text/csv; charset=utf-8' }
}
