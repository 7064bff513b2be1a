import Dexie from 'dexie'
import { IDBFactory, IDBKeyRange } from 'fake-indexeddb'
import { v7 } from 'uuid'
import type { Actor } from '@/lib/model/person'
import { systemTimer } from '@/lib/ports/clock'
import { inProcessLock } from '@/lib/ports/lock'
import { networkOf } from '@/lib/ports/network'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { StoredEntity } from '@/lib/sync/client/entities'
import { Phone } from '@/lib/sync/client/phone'
import type { Indexed } from '@/lib/sync/client/phone-db'
import type { Watch } from '@/lib/sync/client/watch'

/** A fetch that reaches a server of the test: our client only ever hands it a path and an init. */
export type TestFetch = (path: string, init: RequestInit) => Promise<Response>

/** What a test may set of a phone's outside. */
export type TestPorts = Partial<SyncPorts> & {
  actor?: Actor
  indexed?: Indexed
  step?: (name: string) => void
}

// Live queries run only where Dexie sees an IndexedDB of the whole process; each phone still has its own.
Dexie.dependencies.indexedDB = new IDBFactory()
Dexie.dependencies.IDBKeyRange = IDBKeyRange

/** IndexedDB of one phone; hand the same one to a second `createPhone` for a restart or a second tab. */
export const newIndexed = (): Indexed => ({ indexedDB: new IDBFactory(), IDBKeyRange })

/** A clock that moves when it is told to. */
export function testClock(startMs = Date.UTC(2026, 10, 24, 18, 40)) {
  let nowMs = startMs
  return {
    now: () => nowMs,
    set: (ms: number) => {
      nowMs = ms
    },
    pass: (ms: number) => {
      nowMs += ms
    },
  }
}

/** A timer that never goes off by itself: tests call the sender. */
export const noTimer = { after: () => () => undefined }

export const MECHANIC: Actor = {
  shopId: '01980000-0000-7000-8000-000000000001',
  personId: '01980000-0000-7000-8000-000000000101',
  roles: ['mechanic'],
  name: 'Tove Marl',
}

export type TestPhone = {
  phone: Phone
  indexed: Indexed
  ports: SyncPorts
  /** Keeps ops and waits for the try to send them that follows. */
  record: Phone['record']
  /** One whole run of the sender. */
  sync(): Promise<void>
  /** The value of a watch once it has one. */
  see<T>(watch: Watch<T | undefined>): Promise<T>
  rows(entity: StoredEntity): Promise<unknown[]>
  /** As if the process was killed: the store is let go of as it stands. */
  kill(): void
}

/**
 * A phone with a store of its own that talks to `fetch`. It is opened but neither enrolled nor synced:
 * call `phone.enrol()` and `sync()`. Nothing runs by itself; requests wait at most as long as the test.
 */
export async function createPhone(of: {
  ports?: TestPorts
  fetch: TestFetch
  name?: string
}): Promise<TestPhone> {
  const { actor = MECHANIC, indexed = newIndexed(), step, ...given } = of.ports ?? {}
  const ports: SyncPorts = {
    clock: testClock(),
    timer: noTimer,
    ids: { next: () => v7(), share: () => 0.5 },
    lock: inProcessLock(),
    network: networkOf({
      fetch: (input, init) => of.fetch(String(input), init ?? {}),
      online: () => true,
      timer: systemTimer,
    }),
    zone: () => 'Etc/GMT+6',
    ...given,
  }
  const phone = await Phone.open({
    actor,
    ports,
    indexed,
    failed: (cause) => {
      if (step === undefined) throw cause
    },
    ...(step === undefined ? {} : { step }),
  })
  return {
    phone,
    indexed,
    ports,
    record: async (ops, more) => {
      await phone.record(ops, more)
      await phone.sender.idle()
    },
    sync: () => phone.sender.sendNow('tap'),
    see: seen,
    rows: (entity) => seen<unknown[]>(phone.rows(entity) as Watch<unknown[] | undefined>),
    kill: () => phone.close(),
  }
}

/** The first value of a watch that is not undefined, read afresh. */
function seen<T>(watch: Watch<T | undefined>): Promise<T> {
  return new Promise((resolve) => {
    let leave: (() => void) | null = null
    let done = false
    leave = watch.subscribe(() => {
      const value = watch.get()
      if (value === undefined || done) return
      done = true
      queueMicrotask(() => leave?.())
      resolve(value)
    })
  })
}
