/** What a failed statement or connection means for a push. Codes: PostgreSQL 15, appendix A. */
export type DatabaseTrouble =
  /** Somebody else was writing, or the server is going down: the same again works. */
  | 'retry'
  /** The database refused the data itself: an op that no check before had caught. */
  | 'badData'
  /** No connection: nothing was tried. */
  | 'unreachable'
  | 'bug'

/** Lock not available, deadlock, serialization, query cancelled, admin shutdown, idle transaction ended. */
const RETRY = new Set(['55P03', '40P01', '40001', '57014', '57P01', '57P02', '25P03'])
const UNREACHABLE = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ETIMEDOUT',
  'ENOTFOUND',
  '53300',
  '57P03',
])

/** Sorts an error thrown by a query. */
export function troubleOf(error: unknown): DatabaseTrouble {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  if (RETRY.has(code)) return 'retry'
  if (UNREACHABLE.has(code) || code.startsWith('08')) return 'unreachable'
  if (code.startsWith('22') || code.startsWith('23')) return 'badData'
  const words = error instanceof Error ? error.message : ''
  return /connection (terminated|timeout)|timeout exceeded when trying to connect|not queryable/i.test(
    words,
  )
    ? 'unreachable'
    : 'bug'
}
