// One phone of a run: its IndexedDB, the people who use it, its clock, its signal and its tabs.
import { IDBObjectStore } from 'fake-indexeddb'
import { AppError } from '@/lib/model/result'
import type { Lock } from '@/lib/ports/lock'
import { networkOf } from '@/lib/ports/network'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { Phone } from '@/lib/sync/client/phone'
import { newIndexed } from '../../support/phone'
import { closeStore } from './emptying'
import { send } from './line'
import type { SimPerson, SimShop } from './shop-set'
import type { Actor } from './stage'
import type { World } from './world'

/** Who uses a phone: a person of a shop. One of another shop may use the same phone. */
export type User = { shop: SimShop; person: SimPerson; cookie: string | null }

/** What a killed program throws: it is ended, and nothing it awaits comes back. */
class Killed extends Error {}

export type Tab = {
  phone: Phone
  /** Set while it takes part in a race. */
  actor: Actor | undefined
  /** Steps until the program is killed; null: it is not. */
  killIn: number | null
  killedAt: string | null
  user: User
}

type Timer = { dueMs: number; run: () => void }
type Stores = { [name: string]: unknown }

export class Handset {
  readonly name: string
  readonly maker: number
  readonly users: User[]
  readonly indexed = newIndexed()
  /** Schema of each op as it was written or first sent, once the phone has run an older app. */
  readonly schemaOf = new Map<string, number>()
  hasBeenOld: boolean = false
  /** Tables that have no room left. */
  readonly full = new Set<string>()
  user: User
  tabs: Tab[] = []
  skewMs = 0
  zone = 'Etc/GMT+6'
  signal: boolean = true
  /** What app it runs: today's, the one before, or one too old to be served. */
  protocol: 'now' | 'before' | 'ancient' = 'now'
  /** Without Web Locks every tab sends for itself. */
  hasLocks: boolean = true
  /** Trouble that no fault explains. */
  readonly troubles: string[] = []
  readonly #world: World
  readonly #timers = new Set<Timer>()
  readonly #locks = new Map<string, Promise<void>>()

  constructor(world: World, maker: number, name: string, users: User[]) {
    this.#world = world
    this.maker = maker
    this.name = name
    this.users = users
    const [first] = users
    if (first === undefined) throw new Error('a phone needs somebody')
    this.user = first
    handsets.add(this)
  }

  get cookie(): string | null {
    return this.user.cookie
  }

  /** The tab in front; opened when there is none. */
  async tab(): Promise<Tab> {
    return this.tabs[0] ?? (await this.openTab())
  }

  /** Opens a tab of whoever uses the phone. */
  async openTab(): Promise<Tab> {
    const { person, shop } = this.user
    const tab: Tab = {
      phone: undefined as unknown as Phone,
      actor: undefined,
      killIn: null,
      killedAt: null,
      user: this.user,
    }
    tab.phone = await Phone.open({
      actor: { shopId: shop.id, personId: person.id, roles: person.roles, name: person.name },
      indexed: this.indexed,
      ports: this.#ports(tab),
      failed: (cause) => this.#failed(cause),
      step: (name) => stepOf(tab, name),
      onWipe: (phone) => closeStore(this.#world, this, phone, (name) => stepOf(tab, name)),
    })
    this.tabs.push(tab)
    return tab
  }

  /** Ends every tab, as when the app is closed; what a killed one left behind is found at the next opening. */
  async close(): Promise<void> {
    for (const tab of this.tabs.splice(0)) {
      await tab.phone.sender.idle()
      tab.phone.close()
    }
    this.#timers.clear()
  }

  /** Lets go of killed tabs; answers the steps they were killed at. */
  async bury(): Promise<string[]> {
    const dead = this.tabs.filter((tab) => tab.killedAt !== null)
    for (const tab of this.tabs) tab.killIn = null
    if (dead.length === 0) return []
    // The whole process is gone, and every tab with it.
    for (const tab of this.tabs) tab.killedAt ??= 'with the process'
    await this.close()
    return dead.map((tab) => tab.killedAt ?? '')
  }

  async use(user: User): Promise<void> {
    await this.close()
    this.user = user
  }

  /** Lets everything go off that is due by now. */
  async ring(): Promise<void> {
    const nowMs = this.#world.truth.now()
    const due = [...this.#timers].filter((timer) => timer.dueMs <= nowMs)
    due.sort((a, b) => a.dueMs - b.dueMs)
    for (const timer of due) {
      if (!this.#timers.delete(timer)) continue
      timer.run()
      for (const tab of this.tabs) await tab.phone.sender.idle()
    }
  }

  hasTable(store: unknown): boolean {
    const factory = this.indexed.indexedDB as unknown as { _databases: Map<string, unknown> }
    return [...factory._databases.values()].includes(store)
  }

  #failed(cause: unknown): void {
    if (cause instanceof Killed || isFull(cause) || isClosed(cause)) return
    this.troubles.push(cause instanceof Error ? (cause.stack ?? cause.message) : String(cause))
  }

  #ports(tab: Tab): SyncPorts {
    const { truth } = this.#world
    const timer = { after: (delayMs: number, run: () => void) => this.#after(delayMs, run) }
    return {
      clock: { now: () => truth.now() + this.skewMs },
      timer,
      ids: { next: () => truth.id(this.maker), share: () => 0.5 },
      lock: this.#lock(tab),
      network: networkOf({
        fetch: (path, init) => send(this.#world, this, tab, String(path), init ?? {}),
        online: () => this.signal,
        timer,
      }),
      zone: () => this.zone,
    }
  }

  #after(delayMs: number, run: () => void): () => void {
    const timer = { dueMs: this.#world.truth.now() + delayMs, run }
    this.#timers.add(timer)
    return () => {
      this.#timers.delete(timer)
    }
  }

  #lock(tab: Tab): Lock {
    return {
      run: async (name, work) => {
        if (!this.hasLocks) return await work()
        const before = this.#locks.get(name)
        let free: () => void = () => undefined
        this.#locks.set(
          name,
          new Promise((resolve) => {
            free = resolve
          }),
        )
        try {
          if (before !== undefined) await this.#world.stage.wait(tab.actor, before)
          await work()
        } finally {
          free()
        }
      },
    }
  }
}

function stepOf(tab: Tab, name: string): void {
  if (tab.killedAt !== null) throw new Killed(`killed at ${tab.killedAt}`)
  if (tab.killIn === null) return
  tab.killIn -= 1
  if (tab.killIn > 0) return
  tab.killedAt = name
  throw new Killed(`killed at ${name}`)
}

/** True for a killed program, and for whatever wraps its end. */
export const isKilled = (cause: unknown): boolean =>
  cause instanceof Killed || (cause instanceof Error && isKilled(inside(cause)))

/** True for a phone without room. */
export const isFull = (cause: unknown): boolean =>
  (cause instanceof AppError && cause.kind === 'storeFull') ||
  (cause instanceof Error && (cause.name === 'QuotaExceededError' || isFull(inside(cause))))

/** The store was let go of, or is being emptied. */
const isClosed = (cause: unknown): boolean =>
  cause instanceof Error && (cause.name === 'DatabaseClosedError' || cause.message === 'storeWiped')

const inside = (cause: Error): unknown =>
  cause.cause ?? (cause as Error & { inner?: unknown }).inner

const handsets = new Set<Handset>()

/** Forgets the phones of a run that is over. */
export function forgetHandsets(): void {
  handsets.clear()
}

/** Makes IndexedDB refuse what has no room, as a browser does at its quota. */
function guardRoom(): void {
  const stores = IDBObjectStore.prototype as unknown as Stores
  for (const name of ['put', 'add']) {
    const plain = stores[name] as (...args: unknown[]) => unknown
    stores[name] = function guarded(this: RoomOf, ...args: unknown[]): unknown {
      const raw = this.transaction.db._rawDatabase
      for (const handset of handsets) {
        if (handset.full.has(this.name) && handset.hasTable(raw)) {
          throw new DOMException('no room', 'QuotaExceededError')
        }
      }
      return plain.apply(this, args)
    }
  }
}
type RoomOf = { name: string; transaction: { db: { _rawDatabase: unknown } } }

guardRoom()
