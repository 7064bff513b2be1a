import { type Clock, systemClock, systemTimer, systemZone, type Timer } from './clock'
import { type Ids, uuidv7 } from './ids'
import { type Lock, webLock } from './lock'
import { type Network, networkOf } from './network'

/** What the phone's store and its sender need of the outside; the service worker has these alone. */
export type SyncPorts = {
  clock: Clock
  timer: Timer
  ids: Ids
  lock: Lock
  network: Network
  zone(): string
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
}
