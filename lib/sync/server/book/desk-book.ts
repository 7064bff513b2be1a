import { asShop, type ShopTx } from '@/db/client'
import { itemsOfVersion, type PlacedItem } from '@/db/queries/code-book'
import { placedOfDraft } from '@/db/queries/code-book-draft'
import { type BookHead, bookHeads, sourcesOf } from '@/db/queries/code-book-heads'
import { listWithdrawals } from '@/db/queries/code-book-withdrawal'
import { listPeople } from '@/db/queries/people'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { BookVersionRow, DeskBook } from '@/lib/model/book-desk'
import type { Id } from '@/lib/model/id'

/** So many versions are listed, the newest first (a choice); older ones stay and are served. */
const MOST_VERSIONS = 20

/** The shop's code book as the owner sees it: the draft, the versions, what was withdrawn and who knows. */
export async function readDeskBook(shopId: Id): Promise<DeskBook> {
  return await asShop(shopId, async (tx) => {
    const withdrawals = await listWithdrawals(tx)
    const people = (await listPeople(tx)).map(({ id, name }) => ({ id, name }))
    const seen: Seen = {
      gone: withdrawnVersions(withdrawals),
      names: new Map(people.map((person) => [person.id, person])),
      held: new Map(),
    }
    const versions: BookVersionRow[] = []
    for (const head of await bookHeads(tx, MOST_VERSIONS)) {
      versions.push(await rowOf(tx, head, seen))
    }
    return { versions, withdrawals, people }
  })
}

type Seen = {
  gone: ReadonlySet<number>
  names: ReadonlyMap<Id, DeskBook['people'][number]>
  /** Items by version, each read once. */
  held: Map<number, PlacedItem[]>
}

async function rowOf(tx: ShopTx, head: BookHead, seen: Seen): Promise<BookVersionRow> {
  const { version, hash, at, note } = head
  const items = await itemsOf(tx, version, seen)
  const before = baseOf(head)
  const hashes = items.map((item) => item.hash)
  return {
    version,
    state: stateOf(version, seen.gone),
    hash,
    at,
    madeBy: seen.names.get(head.madeBy ?? '') ?? null,
    publishedBy: seen.names.get(head.publishedBy ?? '') ?? null,
    note,
    counts: countsOf(items),
    sources: await sourcesOf(tx, hashes),
    since:
      before === null
        ? null
        : { version: before, ...changes(await itemsOf(tx, before, seen), items) },
  }
}

async function itemsOf(tx: ShopTx, version: number | null, { held }: Seen): Promise<PlacedItem[]> {
  if (version === null) return await placedOfDraft(tx)
  const items = held.get(version) ?? (await itemsOfVersion(tx, version))
  held.set(version, items)
  return items
}

/** The version that changes are told from: the one it was made from, else the one before. */
function baseOf({ version, basedOn }: BookHead): number | null {
  if (basedOn !== null) return basedOn
  return version === null || version === 1 ? null : version - 1
}

function stateOf(version: number | null, gone: Seen['gone']): BookVersionRow['state'] {
  if (version === null) return 'draft'
  return gone.has(version) ? 'withdrawn' : 'published'
}

function countsOf(items: readonly PlacedItem[]): Record<string, number> {
  const counts: Record<string, number> = {}
  for (const { kind } of items) counts[kind] = (counts[kind] ?? 0) + 1
  return counts
}

/** Items by `kind id` that came, have another content, or went. */
function changes(before: readonly PlacedItem[], after: readonly PlacedItem[]) {
  const key = ({ kind, itemId }: PlacedItem) => `${kind} ${itemId}`
  const was = new Map(before.map((item) => [key(item), item.hash]))
  const is = new Map(after.map((item) => [key(item), item.hash]))
  const differs = (name: string) => was.has(name) && was.get(name) !== is.get(name)
  return {
    added: [...is.keys()].filter((name) => !was.has(name)),
    changed: [...is.keys()].filter(differs),
    gone: [...was.keys()].filter((name) => !is.has(name)),
  }
}
