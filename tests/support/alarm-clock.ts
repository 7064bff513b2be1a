import type { Timer } from '@/lib/ports/clock'

type Alarm = { atMs: number; run: () => void; order: number }

/**
 * Clock and timer of one world whose time passes only when the test lets it. Between two alarms
 * everything that was set going is brought to its end by `settle`.
 */
export class AlarmClock {
  #nowMs: number
  #alarms: Alarm[] = []
  #order = 0

  constructor(startMs = Date.UTC(2026, 10, 24, 18, 40)) {
    this.#nowMs = startMs
  }

  readonly now = (): number => this.#nowMs

  /** A timer; while `frozen` answers true none of its alarms rings, as in a page that is put to sleep. */
  timer(frozen: () => boolean = () => false): Timer {
    return {
      after: (delayMs, run) => {
        this.#order += 1
        const alarm = {
          atMs: this.#nowMs + delayMs,
          order: this.#order,
          run: () => {
            if (!frozen()) run()
          },
        }
        this.#alarms.push(alarm)
        return () => {
          this.#alarms = this.#alarms.filter((one) => one !== alarm)
        }
      },
    }
  }

  /** Resolves when so much time has passed. */
  pause(delayMs: number): Promise<void> {
    return new Promise((resolve) => this.timer().after(delayMs, resolve))
  }

  /** Lets time pass up to so many ms, ringing what is due in its order. */
  async pass(ms: number, settle: () => Promise<void>): Promise<void> {
    const endMs = this.#nowMs + ms
    await settle()
    for (;;) {
      const next = this.#alarms
        .filter((alarm) => alarm.atMs <= endMs)
        .sort((a, b) => a.atMs - b.atMs || a.order - b.order)[0]
      if (next === undefined) break
      this.#alarms = this.#alarms.filter((alarm) => alarm !== next)
      this.#nowMs = next.atMs
      next.run()
      await settle()
    }
    this.#nowMs = endMs
  }
}

/** Lets everything that is under way in the store, in crypto and in promises come to rest. */
export async function quiet(turns = 60): Promise<void> {
  for (let turn = 0; turn < turns; turn += 1) {
    // Crypto runs beside this thread, in order of asking: what was asked before this is done after it.
    await crypto.subtle.digest('SHA-256', new Uint8Array(64))
    for (let i = 0; i < 4; i += 1) await new Promise((resolve) => setImmediate(resolve))
  }
}
