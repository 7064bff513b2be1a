import { asShop, type ShopTx } from '@/db/client'
import { lockShop, takeChanges } from '@/db/queries/changes'
import {
  type BookVersion,
  bookItem,
  publishBook,
  publishedBook,
  publishedVersion,
  unseparatedOf,
  versionsByNumber,
} from '@/db/queries/code-book'
import { contentsOf, insertWithdrawal, listWithdrawals } from '@/db/queries/code-book-withdrawal'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { WithdrawForm } from '@/lib/model/book-withdrawal'
import type { Id } from '@/lib/model/id'
import { fail, ok, type Result } from '@/lib/model/result'
import { type BookHand, mayPublish, note } from './take-draft'

export type WithdrawProblem = {
  /** `notFound`: the newest version has no such item. `noLimit`: the check has no limit of the book's own. */
  kind: 'forbidden' | 'notFound' | 'noLimit' | 'withdrawnBefore' | 'noneBefore'
}
export type WithdrawnNow = { id: Id; published: BookVersion | null }

/**
 * Withdraws an item of the book for safety, in every version that has the same content (R23); or a whole version:
 * then the last good one before it is published again as the next, so that versions only go up. Phones hear of it
 * at their next contact. Whoever withdraws it stands on record.
 */
export async function withdraw(
  hand: BookHand,
  form: WithdrawForm,
): Promise<Result<WithdrawnNow, WithdrawProblem>> {
  if (!mayPublish(hand)) return fail({ kind: 'forbidden' })
  return await asShop(hand.actor.shopId, async (tx) => {
    await lockShop(tx)
    return form.what === 'version'
      ? await withdrawVersion(tx, hand, form)
      : await withdrawItem(tx, hand, form)
  })
}

type ItemForm = Exclude<WithdrawForm, { what: 'version' }>
type VersionForm = Extract<WithdrawForm, { what: 'version' }>

async function withdrawItem(
  tx: ShopTx,
  hand: BookHand,
  form: ItemForm,
): Promise<Result<WithdrawnNow, WithdrawProblem>> {
  const kind = form.what === 'limit' ? 'check' : form.what
  const found = await bookItem(tx, { kind, id: form.itemId })
  if (!found) return fail({ kind: 'notFound' })
  const { item } = found
  if (form.what === 'limit' && (item.kind !== 'check' || item.reading?.fallback == null))
    return fail({ kind: 'noLimit' })
  const of = { itemId: form.itemId, what: form.what }
  if (await isWithdrawn(tx, of, found.version)) return fail({ kind: 'withdrawnBefore' })
  const hashes = await contentsOf(tx, { kind, itemId: form.itemId })
  const name = 'name' in item ? item.name : form.itemId
  const id = await putDown(tx, hand, { ...form, version: null, hashes, name })
  await takeChanges(tx, [{ entity: 'bookWithdrawal', id, jobId: null }])
  return ok({ id, published: null })
}

const isWithdrawn = async (
  tx: ShopTx,
  { what, itemId }: Pick<ItemForm, 'what' | 'itemId'>,
  version: number,
): Promise<boolean> =>
  (await listWithdrawals(tx)).some(
    (one) => one.what === what && one.itemId === itemId && one.versions.includes(version),
  )

async function withdrawVersion(
  tx: ShopTx,
  hand: BookHand,
  form: VersionForm,
): Promise<Result<WithdrawnNow, WithdrawProblem>> {
  const newest = await publishedVersion(tx)
  const [found] = await versionsByNumber(tx, [form.version])
  if (!newest || !found) return fail({ kind: 'notFound' })
  const gone = new Set(withdrawnVersions(await listWithdrawals(tx)))
  if (gone.has(form.version)) return fail({ kind: 'withdrawnBefore' })
  gone.add(form.version)
  const isNewest = form.version === newest.version
  const before = isNewest ? await lastGood(tx, form.version, gone) : null
  if (isNewest && before === null) return fail({ kind: 'noneBefore' })
  const name = `Version ${form.version}`
  const id = await putDown(tx, hand, { ...form, itemId: null, hashes: [], name })
  const published =
    before === null ? null : await publishAgain(tx, hand, before, newest.version + 1)
  await takeChanges(tx, [
    ...(published === null
      ? []
      : [{ entity: 'book' as const, id: String(published.version), jobId: null }]),
    ...(await touchedWithdrawals(tx)),
  ])
  return ok({ id, published })
}

/** The newest version before this one that was not withdrawn. */
async function lastGood(
  tx: ShopTx,
  before: number,
  gone: ReadonlySet<number>,
): Promise<number | null> {
  const numbers = Array.from({ length: before - 1 }, (_, n) => n + 1).filter((n) => !gone.has(n))
  const found = (await versionsByNumber(tx, numbers)).map(({ version }) => version)
  return found.length === 0 ? null : Math.max(...found)
}

async function publishAgain(
  tx: ShopTx,
  hand: BookHand,
  old: number,
  version: number,
): Promise<BookVersion> {
  const book = await publishedBook(tx, old)
  const unseparated = await unseparatedOf(tx, old)
  const made = await publishBook(tx, {
    version,
    items: book?.items ?? [],
    publishedAt: new Date(hand.now).toISOString(),
    publishedBy: hand.actor.personId,
    origin: {
      basedOn: old,
      madeBy: hand.actor.personId,
      note: `Version ${old} again`,
      unseparated,
    },
  })
  const detail = { hash: made.hash, basedOn: old }
  await note(tx, hand, { action: 'book.published', entityId: String(version), detail })
  return made
}

/** Every withdrawal changes with a new version: in which ones it holds. */
export const touchedWithdrawals = async (tx: ShopTx) =>
  (await listWithdrawals(tx)).map(({ id }) => ({
    entity: 'bookWithdrawal' as const,
    id,
    jobId: null,
  }))

async function putDown(
  tx: ShopTx,
  hand: BookHand,
  of: Pick<WithdrawForm, 'what' | 'reason' | 'instead'> & {
    itemId: string | null
    version: number | null
    hashes: readonly string[]
    name: string
  },
): Promise<Id> {
  const id = hand.newId()
  const { what, itemId, version, hashes, name, reason, instead } = of
  const withdrawnAt = new Date(hand.now).toISOString()
  const withdrawnBy = hand.actor.personId
  const row = { id, what, itemId, version, hashes, name, reason, instead, withdrawnAt, withdrawnBy }
  await insertWithdrawal(tx, row)
  const detail = { what, itemId, version, withdrawal: id }
  await note(tx, hand, { action: 'book.withdrawn', entityId: itemId ?? String(version), detail })
  return id
}
