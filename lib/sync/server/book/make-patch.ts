import type { PlacedItem } from '@/db/queries/code-book'
import type { CodeBookItem } from '@/lib/model/code-book'
import { type BookPatch, itemKey } from '@/lib/sync/protocol/book'

type Changes = Pick<BookPatch, 'drop' | 'move'> & {
  /** Places and hashes of items whose content the other side has not. */
  put: [place: number, hash: string][]
}

const keyOf = ({ kind, itemId }: PlacedItem): string => itemKey({ kind, id: itemId })

/**
 * What turns one version into another, both in their order: items that are gone, those that are new or have
 * another content, and those that only stand elsewhere. As few as can be of the last are named: the longest
 * run that keeps its order stays.
 */
export function changesBetween(
  before: readonly PlacedItem[],
  after: readonly PlacedItem[],
): Changes {
  const old = new Map(before.map((item, n) => [keyOf(item), { hash: item.hash, n }]))
  const kept = new Set(after.map(keyOf))
  const drop = [...old.keys()].filter((key) => !kept.has(key))
  const same = after
    .map((item) => ({ key: keyOf(item), was: old.get(keyOf(item)), hash: item.hash }))
    .filter(({ was, hash }) => was?.hash === hash)
  const staying = longestRun(same.map(({ key, was }) => ({ key, n: was?.n ?? 0 })))
  const put: Changes['put'] = []
  const move: Changes['move'] = []
  for (const [place, item] of after.entries()) {
    const key = keyOf(item)
    if (old.get(key)?.hash !== item.hash) put.push([place, item.hash])
    else if (!staying.has(key)) move.push([place, key])
  }
  return { drop, put, move }
}

/** The keys of the longest run whose old places rise (patience sorting). */
function longestRun(items: readonly { key: string; n: number }[]): Set<string> {
  type Link = { key: string; n: number; before: Link | null }
  const tails: Link[] = []
  for (const { key, n } of items) {
    let low = 0
    let high = tails.length
    while (low < high) {
      const middle = (low + high) >> 1
      if ((tails[middle]?.n ?? 0) < n) low = middle + 1
      else high = middle
    }
    tails[low] = { key, n, before: tails[low - 1] ?? null }
  }
  const run = new Set<string>()
  for (let at = tails.at(-1) ?? null; at !== null; at = at.before) run.add(at.key)
  return run
}

/** The contents put to their hashes; one that is missing is left out, and the phone finds the hash wrong. */
export const withContents = (
  put: Changes['put'],
  contents: ReadonlyMap<string, CodeBookItem>,
): BookPatch['put'] =>
  put.flatMap(([place, hash]) => {
    const item = contents.get(hash)
    return item === undefined ? [] : [[place, item] as [number, CodeBookItem]]
  })
