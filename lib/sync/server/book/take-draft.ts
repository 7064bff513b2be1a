import { asShop, type ShopTx } from '@/db/client'
import type { BookProblem } from '@/db/codebook/book-problem'
import { checkBook } from '@/db/codebook/check-book'
import type { BookFile } from '@/db/codebook/file-problem'
import { appendAudit } from '@/db/queries/audit'
import { lockShop } from '@/db/queries/changes'
import { publishedVersion } from '@/db/queries/code-book'
import { draftItems, dropDraft, findDraft, saveDraft } from '@/db/queries/code-book-draft'
import { listModels } from '@/db/queries/machines'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import { may } from '@/lib/shop/permissions'

/** Who works on the book, and what the server hands in. */
export type BookHand = {
  actor: Pick<Actor, 'shopId' | 'personId' | 'roles'>
  now: number
  newId: () => Id
}

/** The rights to the book, asked again for every write. */
export const mayPublish = ({ actor }: BookHand): boolean => may(actor.roles, 'book.publish')

/** What became of a draft: what it holds, and what the checker says of it, which does not hinder a draft. */
export type DraftTaken = { hash: string; items: number; findings: BookProblem[] }

/**
 * Keeps a book as the shop's draft, based on its newest version. `hasDraft`: there is one already, and
 * `replace` does not say that it goes. What the checker finds is answered, and stops only the publishing.
 */
export async function takeDraft(
  hand: BookHand,
  of: { book: BookFile; note: string | null; replace: boolean },
): Promise<Result<DraftTaken, { kind: 'forbidden' | 'hasDraft' }>> {
  if (!mayPublish(hand)) return fail({ kind: 'forbidden' })
  const { actor } = hand
  const findings = await findingsOf(actor.shopId, of.book)
  const at = new Date(hand.now).toISOString()
  return await asShop(actor.shopId, async (tx) => {
    await lockShop(tx)
    if ((await findDraft(tx)) !== undefined) {
      if (!of.replace) return fail({ kind: 'hasDraft' as const })
      await dropDraft(tx)
    }
    const { items, unseparated } = of.book
    const basedOn = (await publishedVersion(tx))?.version ?? null
    const { hash } = await saveDraft(tx, {
      items,
      basedOn,
      madeAt: at,
      madeBy: actor.personId,
      note: of.note,
      unseparated: unseparated.map(({ faults: [a, b], reason }) => ({ faults: [a, b], reason })),
    })
    await note(tx, hand, { action: 'book.drafted', detail: { hash, basedOn, items: items.length } })
    return ok({ hash, items: items.length, findings })
  })
}

/** Takes the draft away. `noDraft`: there is none. */
export async function leaveDraft(
  hand: BookHand,
): Promise<Result<null, { kind: 'forbidden' | 'noDraft' }>> {
  if (!mayPublish(hand)) return fail({ kind: 'forbidden' })
  return await asShop(hand.actor.shopId, async (tx) => {
    await lockShop(tx)
    const draft = await findDraft(tx)
    if (draft === undefined) return fail({ kind: 'noDraft' as const })
    await dropDraft(tx)
    await note(tx, hand, { action: 'book.draftDropped', detail: { hash: draft.hash } })
    return ok(null)
  })
}

/** The draft as it lies there, to be checked or written to a file; undefined without one. */
export async function readDraft(shopId: Id): Promise<{ hash: string; book: BookFile } | undefined> {
  return await asShop(shopId, async (tx) => {
    const draft = await findDraft(tx)
    if (draft === undefined) return undefined
    const { hash, unseparated } = draft
    return { hash, book: { items: await draftItems(tx), unseparated } }
  })
}

/** What the checker finds in a book together with the shop's own models. */
export async function findingsOf(shopId: Id, book: BookFile): Promise<BookProblem[]> {
  const models = await asShop(shopId, (tx) => listModels(tx))
  return checkBook(book.items, models, book.unseparated)
}

/** A line of the shop's audit trail about the book. */
export async function note(
  tx: ShopTx,
  { actor, now, newId }: BookHand,
  of: { action: string; entityId?: string; detail: Record<string, unknown> },
): Promise<void> {
  const { action, entityId = 'draft', detail } = of
  await appendAudit(tx, [
    {
      id: newId(),
      jobId: null,
      at: new Date(now).toISOString(),
      actorId: actor.personId,
      deviceId: null,
      action,
      entity: 'book',
      entityId,
      detail,
    },
  ])
}
