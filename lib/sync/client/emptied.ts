import Dexie from 'dexie'
import { DeviceDb, setNobody, wasEmptied } from './device-db'
import type { Indexed } from './phone-db'

async function withDevice<T>(
  indexed: Indexed,
  run: (db: DeviceDb) => Promise<T>,
  none: T,
): Promise<T> {
  // A browser that never opened the field is left without its database.
  if (!(await Dexie.exists('farbench-device'))) return none
  const db = new DeviceDb(indexed)
  try {
    return await run(db)
  } finally {
    db.close()
  }
}

/** True when a phone that was taken out has been emptied here and nobody has signed in since (Q4). */
export const readEmptied = (indexed: Indexed = {}): Promise<boolean> =>
  withDevice(indexed, wasEmptied, false)

/** Locks the field on this browser: whoever opens it next has to sign in (SO4). Every store stays. */
export const lockField = (indexed: Indexed = {}): Promise<void> =>
  withDevice(indexed, (db) => setNobody(db, null), undefined)
