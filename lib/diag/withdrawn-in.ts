import type { BookWithdrawal } from '@/lib/model/book-withdrawal'

/** What the engine needs to know of a withdrawal. */
export type Taken = Pick<BookWithdrawal, 'id' | 'what' | 'itemId' | 'versions' | 'upTo'>

/** True where it holds: in the versions named, and in later ones until the shop has said which (rule R23). */
export const holdsIn = ({ what, versions, upTo }: Taken, version: number): boolean =>
  versions.includes(version) || (what !== 'version' && version > upTo)

/** Versions that were withdrawn whole. */
export const withdrawnVersions = (taken: readonly Taken[]): ReadonlySet<number> =>
  new Set(taken.flatMap(({ what, versions }) => (what === 'version' ? versions : [])))
