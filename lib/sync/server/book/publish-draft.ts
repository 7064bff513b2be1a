import { asShop, type ShopTx } from '@/db/client'
import type { BookProblem } from '@/db/codebook/book-problem'
import { lockShop, takeChanges } from '@/db/queries/changes'
import { type BookVersion, publishBook, publishedVersion } from '@/db/queries/code-book'
import { draftItems, dropDraft, findDraft } from '@/db/queries/code-book-draft'
import { fail, ok, type Result } from '@/lib/model/result'
import { type BookHand, findingsOf, mayPublish, note, readDraft } from './take-draft'
import { touchedWithdrawals } from './withdraw'

export type PublishProblem =
  | { kind: 'forbidden' | 'noDraft' }
  /** The draft is the newest version already. */
  | { kind: 'nothingNew'; version: number }
  /** The checker has findings: nothing is published. */
  | { kind: 'findings'; findings: BookProblem[] }
  /** Another draft came while this one was checked. */
  | { kind: 'overtaken' }

/**
 * Publishes the draft as the shop's next version, when the checker finds nothing wrong with it (CB1 and on).
 * It is checked outside of the transaction, as that takes a while, and published only if it is still the
 * same. Phones hear of it by the change number of the version.
 */
export async function publishDraft(hand: BookHand): Promise<Result<BookVersion, PublishProblem>> {
  if (!mayPublish(hand)) return fail({ kind: 'forbidden' })
  const { shopId } = hand.actor
  const draft = await readDraft(shopId)
  if (draft === undefined) return fail({ kind: 'noDraft' })
  const findings = await findingsOf(shopId, draft.book)
  if (findings.length > 0) return fail({ kind: 'findings', findings })
  return await asShop(shopId, async (tx) => {
    await lockShop(tx)
    return await publishChecked(tx, hand, draft.hash)
  })
}

async function publishChecked(
  tx: ShopTx,
  hand: BookHand,
  checked: string,
): Promise<Result<BookVersion, PublishProblem>> {
  const draft = await findDraft(tx)
  if (draft?.hash !== checked) return fail({ kind: 'overtaken' })
  const newest = await publishedVersion(tx)
  if (newest?.hash === checked) return fail({ kind: 'nothingNew', version: newest.version })
  const { basedOn, madeBy, note: about, unseparated } = draft
  const made = await publishBook(tx, {
    version: (newest?.version ?? 0) + 1,
    items: await draftItems(tx),
    publishedAt: new Date(hand.now).toISOString(),
    publishedBy: hand.actor.personId,
    origin: { basedOn, madeBy, note: about, unseparated },
  })
  await dropDraft(tx)
  const { version, hash } = made
  const of = {
    action: 'book.published',
    entityId: String(version),
    detail: { hash, basedOn, madeBy },
  }
  await note(tx, hand, of)
  await takeChanges(tx, [
    { entity: 'book', id: String(version), jobId: null },
    ...(await touchedWithdrawals(tx)),
  ])
  return ok(made)
}
