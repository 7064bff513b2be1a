/**
 * Two brakes against whoever pokes, kept in this process: a restart forgets them and several processes
 * count apart. Limits are choices; an honest phone or desk stays far below them.
 */
export type Allowance = { name: string; limit: number; windowMs: number }

export const ALLOWANCES = {
  /** Exchanges of one phone: it needs a few a minute. */
  sync: { name: 'sync', limit: 240, windowMs: 60_000 },
  /** Pictures of one phone. */
  photo: { name: 'photo', limit: 240, windowMs: 60_000 },
  /** Chunks of one phone, and questions where an upload stands: 32 kB each are still 5 Mbit/s. */
  chunk: { name: 'chunk', limit: 1_200, windowMs: 60_000 },
  /** Keys enrolled by one person. */
  enrol: { name: 'enrol', limit: 60, windowMs: 3_600_000 },
  /** Event streams opened by one person. */
  stream: { name: 'stream', limit: 120, windowMs: 60_000 },
} as const satisfies Record<string, Allowance>

/** Event streams one process keeps open at once. */
export const MAX_STREAMS = 500

const MAX_KEYS = 20_000
const counts = new Map<string, { since: number; count: number }>()

/** Counts one use at `now` (ms); answers the seconds to wait when it is one too many, else null. */
export function spend(allowance: Allowance, key: string, now: number): number | null {
  const name = `${allowance.name}:${key}`
  const kept = counts.get(name)
  const current = kept && now - kept.since < allowance.windowMs ? kept : { since: now, count: 0 }
  current.count += 1
  counts.delete(name)
  if (counts.size >= MAX_KEYS) counts.delete(counts.keys().next().value ?? '')
  counts.set(name, current)
  if (current.count <= allowance.limit) return null
  return Math.max(1, Math.ceil((current.since + allowance.windowMs - now) / 1000))
}

/** How many big bodies are held unpacked at once, and how many may wait for that. */
const SLOTS = 8
const MAX_WAITING = 200
let busy = 0
const waiting: (() => void)[] = []

/** Runs `run` when a slot is free; null when too many wait already. Bounds the memory of the process. */
export async function inSlot<T>(run: () => Promise<T>): Promise<T | null> {
  if (busy >= SLOTS) {
    if (waiting.length >= MAX_WAITING) return null
    await new Promise<void>((go) => waiting.push(go))
  } else busy += 1
  try {
    return await run()
  } finally {
    const next = waiting.shift()
    if (next) next()
    else busy -= 1
  }
}
