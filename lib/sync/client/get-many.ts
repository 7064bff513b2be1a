import type { Table } from 'dexie'

/** From here on one look at a whole stretch is quicker than a look for each key. */
const MANY = 25

/**
 * The records under these keys, in their order, undefined where there is none. Many that lie close together,
 * as what one phone made in a row does, are read as one stretch: a look for each takes several times as long.
 */
export async function getMany<T, K extends string | number>(
  table: Table<T, K>,
  keys: readonly K[],
  keyOf: (record: T) => K,
): Promise<(T | undefined)[]> {
  if (keys.length < MANY) return await table.bulkGet([...keys])
  // Strings compare here as in IndexedDB, by code units.
  const sorted = [...keys].sort((a, b) => (a < b ? -1 : 1))
  const stretch = table.where(':id').between(sorted[0], sorted.at(-1), true, true)
  if ((await stretch.count()) > 2 * keys.length) return await table.bulkGet([...keys])
  const found = new Map((await stretch.toArray()).map((record) => [keyOf(record), record]))
  return keys.map((key) => found.get(key))
}
