/** Where a figure of the book comes from when no published standard stands behind it. */
export const PRACTICE = 'common practice, no source'
/** Our own wording and ordering of things the trade knows; nothing to measure. */
export const OWN_WORDS = 'own words; common practice, no source'
/** Shares, outcome tables and minutes that nobody counted. */
export const GUESS =
  'common practice, no source; shares and tables are guesses, no count behind them'
