import { asShop } from '@/db/client'
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
