import type { Core } from './core'
import { openJson, sealJson } from './seal'
import { Cell, type Watch } from './watch'

/**
 * Whether what stands on the screen stands in the store: `writing` until the store has said so, `lost`
 * when it could not take it (no room), `nothing` when nothing is half written.
 */
export type DraftKept = 'nothing' | 'writing' | 'kept' | 'lost'

/** What is half written under a key; `value` undefined: nothing. `ready` once the store was looked at. */
export type DraftView = { ready: boolean; value: unknown; kept: DraftKept }

type Home = Pick<Core, 'db' | 'keys' | 'step'> & {
  now(): number
  /** Told whether the last write was kept. */
  kept(isKept: boolean): void
}

/** The place a draft is sealed for. */
const draftPlace = (key: string) => `draft/${key}`

/**
 * One draft, written sealed at every change (R8: to the keystroke). Writes go one after the other; what
 * is typed while one runs is written next, and only the last of it.
 */
export class Draft {
  readonly #cell = new Cell<DraftView>({ ready: false, value: undefined, kept: 'nothing' })
  readonly #home: Home
  readonly #key: string
  #tail: Promise<void> = Promise.resolve()
  /** What is queued to be written; changed in place until its turn comes. */
  #slot: { value: unknown; off: boolean } | null = null
  #touched: boolean = false

  constructor(home: Home, key: string) {
    this.#home = home
    this.#key = key
    this.#tail = this.#load()
  }

  get watch(): Watch<DraftView> {
    return this.#cell
  }

  /** Shows the value at once and writes it. */
  set(value: unknown): void {
    this.#touched = true
    this.#cell.set({ ready: true, value, kept: 'writing' })
    if (this.#slot !== null) {
      this.#slot.value = value
      return
    }
    const slot = { value, off: false }
    this.#slot = slot
    this.#queue(() => this.#write(slot), slot).catch(() => undefined)
  }

  /** Forgets it, also what was still to be written. */
  clear(): Promise<void> {
    this.#touched = true
    if (this.#slot !== null) this.#slot.off = true
    this.#slot = null
    this.#cell.set({ ready: true, value: undefined, kept: 'nothing' })
    return this.#queue(() => this.#home.db.draft.delete(this.#key))
  }

  /** Resolves when everything set so far is written. */
  written(): Promise<void> {
    return this.#tail
  }

  #queue(
    work: () => Promise<void>,
    slot: { value: unknown; off: boolean } | null = null,
  ): Promise<void> {
    const told = (isKept: boolean) => {
      this.#home.kept(isKept)
      const now = this.#cell.get()
      // What was typed meanwhile is not written yet, and speaks for itself when it is.
      if (slot !== null && !slot.off && now.kept === 'writing' && Object.is(now.value, slot.value))
        this.#cell.set({ ...now, kept: isKept ? 'kept' : 'lost' })
    }
    this.#tail = this.#tail.then(work).then(
      () => told(true),
      () => told(false),
    )
    return this.#tail
  }

  async #load(): Promise<void> {
    const { db, keys } = this.#home
    let value: unknown
    try {
      const [held] = await db.life.run(() => db.draft.where('key').equals(this.#key).toArray())
      if (held !== undefined) value = await openJson(keys.store, draftPlace(this.#key), held.body)
    } catch {
      // One that does not open is shown as nothing; it is not deleted until something new is written.
      value = undefined
    }
    const kept = value === undefined ? 'nothing' : 'kept'
    if (!this.#touched) this.#cell.set({ ready: true, value, kept })
  }

  async #write(slot: { value: unknown; off: boolean }): Promise<void> {
    if (slot.off) return
    if (this.#slot === slot) this.#slot = null
    const { db, keys, now, step } = this.#home
    const body = await sealJson(keys.store, draftPlace(this.#key), slot.value)
    step('draftSealed')
    await db.life.run(() => db.draft.put({ key: this.#key, at: now(), body }))
  }
}

/** All drafts of a store; the same key is the same draft wherever it is shown. */
export class Drafts {
  readonly #held = new Map<string, Draft>()
  readonly #home: Home

  constructor(home: Home) {
    this.#home = home
  }

  of(key: string): Draft {
    const held = this.#held.get(key)
    if (held !== undefined) return held
    const draft = new Draft(this.#home, key)
    this.#held.set(key, draft)
    return draft
  }

  /** Waits for what is still being written of these drafts. */
  async settled(keys: readonly string[]): Promise<void> {
    await Promise.all(keys.map((key) => this.#held.get(key)?.written()))
    this.#home.step('draftsSettled')
  }

  /** After a record finished them: nothing of them is left, also not what was written meanwhile. */
  async finished(keys: readonly string[]): Promise<void> {
    await Promise.all(keys.map((key) => this.#held.get(key)?.clear()))
    this.#home.step('draftsFinished')
  }
}
