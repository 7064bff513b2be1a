/**
 * Slows guessing: after 5 failed tries within 15 minutes for one key (an e-mail address) further ones
 * are refused until the window is over (common practice, no source). Kept in this process: a restart
 * forgets it, several processes count apart. Docs: decision 003.
 */
const WINDOW_MS = 15 * 60_000
const LIMIT = 5
const MAX_KEYS = 10_000

type Tries = { count: number; since: number }
const tries = new Map<string, Tries>()

/** Answers whether the key may try again at `now` (ms since 1970). */
export function mayTry(key: string, now: number): boolean {
  const seen = tries.get(key)
  return !seen || now - seen.since > WINDOW_MS || seen.count < LIMIT
}

/** Counts a failed try; the oldest key makes room when 10,000 are kept. */
export function countFailure(key: string, now: number): void {
  const seen = tries.get(key)
  if (seen && now - seen.since <= WINDOW_MS) {
    seen.count += 1
    return
  }
  tries.delete(key)
  if (tries.size >= MAX_KEYS) {
    const oldest = tries.keys().next().value
    if (oldest !== undefined) tries.delete(oldest)
  }
  tries.set(key, { count: 1, since: now })
}

/** Forgets the key's failures after a good sign-in. */
export function forgetFailures(key: string): void {
  tries.delete(key)
}
