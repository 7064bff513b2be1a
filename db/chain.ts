import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'
import { AppError, fail, ok, type Result } from '@/lib/model/result'

// Chained records (R23). hash = sha256 over (previous hash, line feed, canonical text), hex. The text is
// RFC 8785 and kept as text, because jsonb does not promise an order of keys. It holds ids and never a
// name, so that a person can be erased while the chain still verifies. PostgreSQL checks each hash and
// that its forerunner exists; what it cannot see, a row changed by a superuser, verifyChain finds.

/** One link as stored. `order` counts from 1 within its chain; `prevHash` is null for the first. */
export type Link = { order: number; canonical: string; prevHash: string | null; hash: string }

/** Why a chain does not hold, and at which place. */
export type ChainProblem = {
  kind: 'gap' | 'wrongForerunner' | 'wrongHash' | 'wrongColumns'
  order: number
}

/** Answers the canonical text of plain data; throws for what JSON cannot say (NaN, undefined). */
export function canonicalText(record: object): string {
  const text = canonicalize(record)
  if (text === undefined)
    throw new AppError('notJson', { context: { keys: Object.keys(record).slice(0, 9) } })
  return text
}

/** Answers the next link after `prevHash` for a canonical text. */
export function linkHash(prevHash: string | null, canonical: string): string {
  return createHash('sha256')
    .update(`${prevHash ?? ''}\n${canonical}`, 'utf8')
    .digest('hex')
}

/**
 * Answers how many links hold; fails at the first that does not. `links` in order from the first on.
 * `columnsAgree` compares a link's other columns with its text; leave it out to check hashes alone.
 */
export function verifyChain<L extends Link>(
  links: readonly L[],
  columnsAgree: (link: L) => boolean = () => true,
): Result<number, ChainProblem> {
  let prevHash: string | null = null
  let order = 0
  for (const link of links) {
    order += 1
    if (link.order !== order) return fail({ kind: 'gap', order })
    if (link.prevHash !== prevHash) return fail({ kind: 'wrongForerunner', order })
    if (link.hash !== linkHash(prevHash, link.canonical)) return fail({ kind: 'wrongHash', order })
    if (!columnsAgree(link)) return fail({ kind: 'wrongColumns', order })
    prevHash = link.hash
  }
  return ok(order)
}
