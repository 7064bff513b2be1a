import { AppError } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { BatchSize } from './batch-size'
import { enrol } from './enrol'
import type { SendKeys } from './keys'
import { type PhoneDb, readMeta, writeMeta } from './phone-db'
import { newPace } from './photo-turn'
import type { RunEnd } from './run-end'
import { type Progress, type RunStore, SyncRun } from './sync-run'
import type { Need } from './views'
import { Cell } from './watch'

/** Why the sender is called. `record` does not hurry a line that just failed; the others do. */
export type Cause = 'open' | 'record' | 'online' | 'visible' | 'timer' | 'tap' | 'background'

export type SendState = {
  running: Progress | null
  /** Whether the shop answered last time; null before the first call. */
  reached: boolean | null
  need: Need
}

/**
 * P16: full jitter under a ceiling that doubles from 1 s to 5 min. A shop that answers that it is busy has
 * others to hear too: then it begins at 8 s, so that 50 phones do not come back as one.
 */
const FIRST_CEILING_MS = 1_000
const BUSY_CEILING_MS = 8_000
const LAST_CEILING_MS = 300_000
/** How often an idle, visible phone asks what is new (a choice: one small request a minute). */
const IDLE_MS = 60_000
/** After a failure a new record waits for the timer unless the last try is this old. */
const CALM_MS = 5_000
/**
 * A sender that has not moved for this long has lost its turn (P19). With a beat and a look of the others
 * every so often, another takes over within 60 s of the last sign of life.
 */
const STALE_MS = 50_000
const BEAT_MS = 10_000

/**
 * Milliseconds to wait after so many failures in a row; `share` is an even random figure in [0, 1).
 * `busy`: the shop itself asked to wait.
 */
export function backoffMs(failures: number, share: number, busy = false): number {
  const first = busy ? BUSY_CEILING_MS : FIRST_CEILING_MS
  return share * Math.min(LAST_CEILING_MS, first * 2 ** failures)
}

/** The one way anything leaves this phone, in the page and in the worker, under one lock (P19, P20). */
export class PhoneSender {
  readonly state = new Cell<SendState>({ running: null, reached: null, need: null })
  readonly #store: () => Promise<RunStore>
  readonly #db: PhoneDb
  readonly #keys: SendKeys
  readonly #ports: SyncPorts
  readonly #lockName: string
  readonly #size = new BatchSize()
  readonly #pace = newPace()
  readonly #onBook: () => void
  readonly #failed: (cause: unknown) => void
  readonly #onWipe: () => Promise<boolean>
  readonly #onRun: () => Promise<void>
  #running: Promise<void> | null = null
  #again: boolean = false
  /** Somebody asked for a new start while a run went on. */
  #hurried: boolean = false
  #failures = 0
  #lastTryMs = Number.NEGATIVE_INFINITY
  #callOff: (() => void) | null = null
  #stopped: boolean = false

  constructor(of: {
    store: () => Promise<RunStore>
    db: PhoneDb
    keys: SendKeys
    ports: SyncPorts
    shopId: string
    onBook?: () => void
    failed?: (cause: unknown) => void
    /** The shop has all that was on this phone: empties it; false when something new came meanwhile. */
    onWipe?: () => Promise<boolean>
    /** Called after each run. */
    onRun?: () => Promise<void>
  }) {
    this.#store = of.store
    this.#db = of.db
    this.#keys = of.keys
    this.#ports = of.ports
    this.#lockName = `sync:${of.shopId}`
    this.#onBook = of.onBook ?? (() => undefined)
    this.#failed = of.failed ?? (() => undefined)
    this.#onWipe = of.onWipe ?? (() => Promise.resolve(false))
    this.#onRun = of.onRun ?? (() => Promise.resolve())
  }

  /** Calls for a run and does not wait for it. */
  poke(cause: Cause): void {
    if (cause === 'record' && this.#failures > 0 && this.#sinceLastTry() < CALM_MS) return
    this.sendNow(cause).catch(() => undefined)
  }

  /** Runs, or has the present run go round once more; resolves when nothing is left to try. */
  sendNow(cause: Cause): Promise<void> {
    if (this.#stopped) return Promise.resolve()
    if (cause !== 'record' && cause !== 'timer') {
      this.#failures = 0
      this.#hurried = this.#running !== null
    }
    this.#again = true
    this.#running ??= this.#rounds().finally(() => {
      this.#running = null
    })
    return this.#running
  }

  /** Resolves when no run goes on. */
  async idle(): Promise<void> {
    await this.#running
  }

  stop(): void {
    this.#stopped = true
    this.#callOff?.()
  }

  /** The browser is about to freeze this page: whoever else waits may go on at once (P19). */
  yieldTurn(): void {
    if (this.#running !== null) writeMeta(this.#db, 'heartbeat', 0).catch(() => undefined)
  }

  #sinceLastTry(): number {
    return this.#ports.clock.now() - this.#lastTryMs
  }

  async #rounds(): Promise<void> {
    let end = { kind: 'done' } as RunEnd
    try {
      while (this.#again && !this.#stopped) {
        this.#again = false
        end = await this.#round()
        if (end.kind === 'wipe' && (await this.#onWipe())) {
          this.stop()
          return
        }
        const reached = end.kind !== 'unreachable'
        this.#tell({ reached, need: end.kind === 'need' ? end.need : null })
        // A line that came back while the old try was still dying gets its own try.
        if (end.kind !== 'done' && !this.#hurried) break
        this.#hurried = false
      }
    } catch (cause) {
      // Another tab has taken over from this one, or the store fails: what is unsent stays, and is tried again.
      end = { kind: 'wait', afterMs: null }
      if (!(cause instanceof AppError && cause.kind === 'turnTaken')) this.#failed(cause)
    }
    this.#schedule(end)
  }

  async #round(): Promise<RunEnd> {
    let end = { kind: 'done' } as RunEnd
    const work = async () => {
      end = await this.#underLock()
    }
    await this.#ports.lock.run(this.#lockName, work, () => this.#isStale())
    return end
  }

  async #isStale(): Promise<boolean> {
    const beat = (await readMeta(this.#db, 'heartbeat')) ?? 0
    return Math.abs(this.#ports.clock.now() - beat) > STALE_MS
  }

  async #underLock(): Promise<RunEnd> {
    const stopBeating = this.#beat()
    try {
      // A run that is begun anew finds what the first part of it has done.
      const end = await this.#db.life.run(() => this.#oneRun())
      return end.kind === 'enrol' ? await this.#enrolAndRun() : end
    } finally {
      stopBeating()
      this.#tell({ running: null })
    }
  }

  /** The shop does not know this phone's key: tell it, and try once more (P18). */
  async #enrolAndRun(): Promise<RunEnd> {
    const enrolled = await enrol(this.#db, this.#keys, this.#ports)
    if (enrolled.ok) return await this.#oneRun()
    if (enrolled.problem.kind === 'unreachable') return { kind: 'unreachable' }
    return { kind: 'need', need: enrolled.problem.kind }
  }

  async #oneRun(): Promise<RunEnd> {
    this.#lastTryMs = this.#ports.clock.now()
    const run = new SyncRun({
      store: await this.#store(),
      ports: this.#ports,
      size: this.#size,
      pace: this.#pace,
      tell: (running) => this.#tell({ running }),
    })
    const end = await run.run()
    if (run.bookChanged) this.#onBook()
    await this.#onRun()
    return end
  }

  /** Says while it moves that it moves. */
  #beat(): () => void {
    let callOff: () => void = () => undefined
    let over = false
    const beat = () => {
      if (over) return
      writeMeta(this.#db, 'heartbeat', this.#ports.clock.now()).catch(() => undefined)
      callOff = this.#ports.timer.after(BEAT_MS, beat)
    }
    beat()
    return () => {
      over = true
      callOff()
    }
  }

  #schedule(end: RunEnd): void {
    const failed = end.kind === 'unreachable' || end.kind === 'wait'
    this.#failures = failed ? this.#failures + 1 : 0
    const asked = end.kind === 'wait' ? (end.afterMs ?? 0) : 0
    const isBusy = end.kind === 'wait' && end.busy === true
    const delay = failed
      ? asked + backoffMs(this.#failures, this.#ports.ids.share(), isBusy)
      : IDLE_MS * (0.75 + this.#ports.ids.share() / 2)
    this.#callOff?.()
    this.#callOff = null
    if (this.#stopped) return
    this.#callOff = this.#ports.timer.after(delay, () => this.#onTimer(failed))
  }

  /** A hidden page asks for nothing new; what waits is tried all the same. */
  #onTimer(failed: boolean): void {
    const hidden = globalThis.document?.visibilityState === 'hidden'
    if (failed || !hidden) this.poke('timer')
    else this.#schedule({ kind: 'done' })
  }

  #tell(change: Partial<SendState>): void {
    if (!this.#stopped) this.state.set({ ...this.state.get(), ...change })
  }
}
