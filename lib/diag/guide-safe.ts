import type { BookIndex } from './book-index'

/** Ids of the checks and swaps marked safe for guides; none without a book. */
export const guideSafeOf = (index: BookIndex | null): ReadonlySet<string> =>
  new Set(
    [...(index?.checks.values() ?? []), ...(index?.swaps.values() ?? [])]
      .filter((item) => item.guideSafe)
      .map((item) => item.id),
  )
