import type { Actor } from '@/lib/model/person'
import { AppError } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { type Answered, type Applied, applyOutcomes } from './answer'
import { DeviceDb, knownPersons } from './device-db'
import { deviceOf } from './enrol'
import { findSendKeys, findStoreKey, type SendKeys } from './keys'
import { type Indexed, PhoneDb } from './phone-db'
import { PhoneSender } from './phone-sender'
import { photoPlace } from './record'
import { openBytes } from './seal'
import type { RunStore } from './sync-run'

/** The tag under which the browser wakes the worker to send (P20). */
export const SEND_TAG = 'farbench-send'

/**
 * Sends what every person of this phone has unsent, each under their own name (P18), without opening
 * any row: for the service worker, with all tabs closed. It pulls nothing. Throws when work is left, so
 * that the browser wakes the worker again.
 */
export async function sendInBackground(ports: SyncPorts, indexed: Indexed = {}): Promise<void> {
  const device = new DeviceDb(indexed)
  const persons = await knownPersons(device)
  device.close()
  let left = 0
  for (const person of persons) left += await sendFor(person, ports, indexed)
  if (left > 0) throw new AppError('stillUnsent', { retry: true, context: { left } })
}

async function sendFor(person: Actor, ports: SyncPorts, indexed: Indexed): Promise<number> {
  const db = new PhoneDb(person.shopId, person.personId, indexed)
  try {
    const keys = await findSendKeys(db)
    if (keys === null || (await leftToSend(db)) === 0) return 0
    const sender = new PhoneSender({
      store: () => workerStore({ db, keys, person, ports }),
      db,
      keys,
      ports,
      shopId: person.shopId,
    })
    await sender.sendNow('background')
    sender.stop()
    return await leftToSend(db)
  } finally {
    db.close()
  }
}

async function leftToSend(db: PhoneDb): Promise<number> {
  const ops = await db.outbox.where('state').equals('waiting').count()
  const photos = await db.photo.where('state').equals('waiting').count()
  return ops + photos
}

async function workerStore(of: {
  db: PhoneDb
  keys: SendKeys
  person: Actor
  ports: SyncPorts
}): Promise<RunStore> {
  const { db, keys, person, ports } = of
  const step = () => undefined
  const { deviceId } = await deviceOf(db, ports)
  const storeKey = await findStoreKey(db)
  return {
    db,
    outboxKey: keys.outbox,
    sender: { shopId: person.shopId, personId: person.personId, deviceId, pair: keys.device },
    pull: false,
    apply: async (answered: Answered): Promise<Applied> => {
      await applyOutcomes({ db, step }, answered)
      return { more: false, bookChanged: false, wasReset: false }
    },
    openPhoto:
      storeKey === null
        ? null
        : (photo) => openBytes(storeKey, photoPlace(photo.hash), photo.bytes),
    step,
  }
}
