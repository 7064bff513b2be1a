import { asShop } from '@/db/client'
import { publishedBook } from '@/db/queries/code-book'
import { listWithdrawals } from '@/db/queries/code-book-withdrawal'
import type { Withdrawable } from '@/lib/model/book-desk'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { Id } from '@/lib/model/id'

/** What may be withdrawn from the newest version of a shop's code book by its name, in the order of the book. */
export async function readWithdrawable(shopId: Id): Promise<Withdrawable[]> {
  return await asShop(shopId, async (tx) => {
    const book = await publishedBook(tx)
    if (book === undefined) return []
    const gone = new Set(
      (await listWithdrawals(tx))
        .filter(({ versions }) => versions.includes(book.version))
        .map(({ what, itemId }) => `${what}:${itemId}`),
    )
    return book.items.flatMap(partsOf).filter(({ what, id }) => !gone.has(`${what}:${id}`))
  })
}

function partsOf(item: CodeBookItem): Withdrawable[] {
  if (item.kind !== 'check' && item.kind !== 'swap' && item.kind !== 'fault') return []
  const { kind: what, id, name } = item
  const hasLimit = item.kind === 'check' && item.reading?.fallback != null
  return [{ what, id, name }, ...(hasLimit ? [{ what: 'limit' as const, id, name }] : [])]
}
