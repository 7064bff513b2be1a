import type { ShareList } from './chapter'

/** One fault: of 100 calls, one figure per group of machines; 0 means it is not on that list. */
export type ShareRow = readonly [fault: string, ...of100: number[]]

/**
 * The lists of one complaint from its groups and rows. A column and its "something else" add to 100. Guesses of
 * people who do the work, no count behind them: the shop's own closed jobs replace them (rule R5).
 */
export const columns = (
  groups: readonly Omit<ShareList, 'of100'>[],
  rows: readonly ShareRow[],
): ShareList[] =>
  groups.map((group, column) => ({
    ...group,
    of100: Object.fromEntries(
      rows.flatMap(([fault, ...of100]) => {
        const share = of100[column] ?? 0
        return share > 0 ? [[fault, share]] : []
      }),
    ),
  }))
