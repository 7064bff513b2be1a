import { type Clock, systemClock, systemTimer, systemZone, type Timer } from './clock'
import { type Ids, uuidv7 } from './ids'
import { browserKeeper, type Keeper } from './keeper'
import { type Lock, webLock } from './lock'
import { type Network, networkOf } from './network'
import { browserPageCache, type PageCache } from './page-cache'

/** What the phone's store and its sender need of the outside; the service worker has these alone. */
export type SyncPorts = {
  clock: Clock
  timer: Timer
  ids: Ids
  lock: Lock
  network: Network
  zone(): string
  /** Left out where nothing outlives the stores. */
  keeper?: Keeper
  pages?: PageCache
}

/** The browser's own, in a page or in the service worker. */
export const browserSyncPorts: SyncPorts = {
  clock: systemClock,
  timer: systemTimer,
  ids: uuidv7,
  lock: webLock(systemTimer),
  network: networkOf({
    fetch: (input, init) => fetch(input, init),
    online: () => globalThis.navigator?.onLine !== false,
    timer: systemTimer,
  }),
  zone: systemZone,
  keeper: browserKeeper,
  pages: browserPageCache,
}
