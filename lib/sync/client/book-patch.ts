import canonicalize from 'canonicalize'
import { type BookPatch, itemKey } from '@/lib/sync/protocol/book'

/** An item of a book as the phone holds it; its shape is the shop's business. */
export type HeldItem = { kind: string; id: string }

/** The items after the patch, in their order; `moved` keys that are not held are left out, and the hash tells. */
export function patched(held: readonly HeldItem[], patch: BookPatch): HeldItem[] {
  const byKey = new Map(held.map((item) => [itemKey(item), item]))
  const moved = patch.move.flatMap(([place, key]) => {
    const item = byKey.get(key)
    return item === undefined ? [] : [[place, item] as const]
  })
  const entering = [...patch.put, ...moved].toSorted(([a], [b]) => a - b)
  const leaving = new Set([...patch.drop, ...entering.map(([, item]) => itemKey(item))])
  const items = held.filter((item) => !leaving.has(itemKey(item)))
  for (const [place, item] of entering) items.splice(place, 0, item)
  return items
}

/** The SHA-256 of the items' canonical JSON (RFC 8785), lower-case hex: what a version's hash must be. */
export async function hashOfItems(items: readonly unknown[]): Promise<string> {
  const text = canonicalize(items) ?? ''
  const digest = await crypto.subtle.digest('SHA-256', new TextEncoder().encode(text))
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('')
}
