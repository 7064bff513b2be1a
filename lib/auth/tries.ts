/**
 * Slows guessing. A try is counted before the password is looked at and given back when it was right,
 * so that many tries at once pass no more than many in a row. Three brakes, each over 15 minutes
 * (common practice, no source): 5 tries for one e-mail from one address, 30 from one address whatever
 * the e-mail, 100 for one e-mail from everywhere. So wrong tries from elsewhere do not lock a person out
 * before the hundredth. Kept in this process: a restart forgets it, several count apart (decision 003).
 */
const WINDOW_MS = 15 * 60_000
const MAX_KEYS = 10_000
/**
 * A key counted this often makes no room for others (a choice). Each count costs a password check, and no
 * more than about 5,400 of those are done in the window (hash-slots.ts), so such keys never fill the table.
 */
const KEPT_FROM = 3

type Brake = { key: string; limit: number }
type Tries = { count: number; since: number }
/** Whose try it is: the e-mail in small letters, and the client's address (lib/auth/client-address.ts). */
export type Trier = { email: string; address: string }

const tries = new Map<string, Tries>()

const brakesOf = ({ email, address }: Trier): readonly [Brake, Brake, Brake] => [
  { key: `both ${email} ${address}`, limit: 5 },
  { key: `address ${address}`, limit: 30 },
  { key: `email ${email}`, limit: 100 },
]

/** Takes a try at `now` (ms since 1970); false, and nothing is counted, when one of the brakes is used up. */
export function takeTry(by: Trier, now: number): boolean {
  const brakes = brakesOf(by)
  if (brakes.some(({ key, limit }) => countOf(key, now) >= limit)) return false
  for (const { key } of brakes) count(key, now)
  return true
}

/** Gives a try back that decided nothing, as when the server was too busy to look at the password. */
export function giveBackTry(by: Trier): void {
  for (const { key } of brakesOf(by)) {
    const seen = tries.get(key)
    if (seen === undefined) continue
    seen.count -= 1
    if (seen.count <= 0) tries.delete(key)
  }
}

/** After a right password: gives its try back, and forgets the wrong ones of this e-mail from this address. */
export function forgetTries(by: Trier): void {
  giveBackTry(by)
  tries.delete(brakesOf(by)[0].key)
}

function countOf(key: string, now: number): number {
  const seen = tries.get(key)
  return seen && now - seen.since <= WINDOW_MS ? seen.count : 0
}

/** One more; when 10,000 keys are kept one makes room. */
function count(key: string, now: number): void {
  const seen = tries.get(key)
  if (seen && now - seen.since <= WINDOW_MS) {
    seen.count += 1
    return
  }
  tries.delete(key)
  if (tries.size >= MAX_KEYS) makeRoom(now)
  tries.set(key, { count: 1, since: now })
}

/** Drops what is over, else the oldest that was hardly counted: nobody's count is flushed by many new keys. */
function makeRoom(now: number): void {
  for (const [key, { since }] of tries) {
    if (now - since <= WINDOW_MS) break // in the order in which they began
    tries.delete(key)
  }
  if (tries.size < MAX_KEYS) return
  for (const [key, { count: counted }] of tries) {
    if (counted >= KEPT_FROM) continue
    tries.delete(key)
    return
  }
}
