/** Where the time comes from: milliseconds since 1970 in UTC. */
export type Clock = { now(): number }

/** The machine's own clock. */
export const systemClock: Clock = { now: () => Date.now() }

/** The machine's IANA time zone, e.g. `Etc/GMT+6`. */
export const systemZone = (): string => new Intl.DateTimeFormat().resolvedOptions().timeZone

/** Runs something later; the answer calls it off. */
export type Timer = { after(delayMs: number, run: () => void): () => void }

/** The machine's own timer. Delays are from 0 to 2^31 - 1 ms. */
export const systemTimer: Timer = {
  after(delayMs, run) {
    const handle = setTimeout(run, delayMs)
    return () => clearTimeout(handle)
  },
}
