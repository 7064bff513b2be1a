import { v7 } from 'uuid'
import { systemTimer } from '@/lib/ports/clock'
import type { Keeper } from '@/lib/ports/keeper'
import { inProcessLock } from '@/lib/ports/lock'
import { networkOf } from '@/lib/ports/network'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { FieldStore } from '@/lib/sync/client/field-store'
import type { Phone } from '@/lib/sync/client/phone'
import type { Indexed } from '@/lib/sync/client/phone-db'
import type { Session } from '@/lib/sync/client/views'
import { newIndexed, noTimer, type TestFetch } from './phone'

/** Everything a browser keeps for the app: its databases, its few words outside of them, its page copies. */
export type TestBrowser = {
  indexed: Indexed
  keeper: Keeper & { words: string | null }
  pages: { dropped: number; dropAll(): Promise<void> }
  /** The clock of the phone, in ms. */
  clock: { now(): number; ms: number }
}

/** A browser that holds nothing. `nowMs`: what its clock shows. */
export function newBrowser(nowMs = Date.now()): TestBrowser {
  const keeper = {
    words: null as string | null,
    read: () => (keeper.words === null ? [] : [keeper.words]),
    write: (words: string) => {
      keeper.words = words
    },
  }
  const pages = {
    dropped: 0,
    dropAll: () => {
      pages.dropped += 1
      return Promise.resolve()
    },
  }
  const clock = { ms: nowMs, now: () => clock.ms }
  return { indexed: newIndexed(), keeper, pages, clock }
}

/** Names of the databases a browser holds. */
export async function databases({ indexed }: TestBrowser): Promise<string[]> {
  const found = await (indexed.indexedDB as unknown as IDBFactory).databases()
  return found.map((one) => one.name ?? '').sort()
}

export type FieldApp = {
  store: FieldStore
  ports: SyncPorts
  opened(): Promise<Session>
  /** The open store of the person at work. */
  phone(): Phone
  /** One whole run of the sender. */
  sync(): Promise<void>
  /** Lets go of everything, as if the page was closed. */
  end(): Promise<void>
}

/** One start of the field app in this browser. `step` is called at each step of emptying a store. */
export function startApp(
  fetch: TestFetch,
  browser: TestBrowser,
  step: (name: string) => void = () => undefined,
): FieldApp {
  const ports: SyncPorts = {
    clock: browser.clock,
    timer: noTimer,
    ids: { next: () => v7(), share: () => 0.5 },
    lock: inProcessLock(),
    network: networkOf({
      fetch: (input, init) => fetch(String(input), init ?? {}),
      online: () => true,
      timer: systemTimer,
    }),
    zone: () => 'Etc/UTC',
    keeper: browser.keeper,
    pages: browser.pages,
  }
  const store = new FieldStore(ports, browser.indexed, step)
  const stop = store.start()
  const phone = () => {
    const open = store.phone.get()
    if (open === null) throw new Error('nobody is at work')
    return open
  }
  return {
    store,
    ports,
    opened: async () => {
      await store.opened()
      await store.phone.get()?.sender.idle()
      return store.session.get()
    },
    phone,
    sync: () => phone().sender.sendNow('tap'),
    end: async () => {
      await store.phone.get()?.sender.idle()
      stop()
      store.phone.get()?.close()
    },
  }
}
