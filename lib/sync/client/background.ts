import type { Actor } from '@/lib/model/person'
import { AppError } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { openOp } from './core'
import { DeviceDb, knownPersons } from './device-db'
import { deviceOf } from './enrol'
import { findSendKeys, findStoreKey, type SendKeys } from './keys'
import { type Answered, type Applied, applyOutcomes } from './outcomes'
import { type Indexed, PhoneDb } from './phone-db'
import { PhoneSender } from './phone-sender'
import { photoPlace } from './record'
import { openBytes } from './seal'
import type { RunStore } from './sync-run'
import { beginWipe, resumeWipes, type WipeTools } from './wipe'

/** The tag under which the browser wakes the worker to send (P20). */
export const SEND_TAG = 'farbench-send'

/**
 * Sends what every person of this phone has unsent, each under their own name (P18), without opening
 * any row: for the service worker, with all tabs closed. It pulls nothing. Throws when work is left, so
 * that the browser wakes the worker again.
 */
export async function sendInBackground(ports: SyncPorts, indexed: Indexed = {}): Promise<void> {
  const device = new DeviceDb(indexed)
  const tools: WipeTools = { device, ports, indexed, step: () => undefined }
  let left = 0
  try {
    await resumeWipes(tools)
    for (const person of await knownPersons(device)) left += await sendFor(person, ports, tools)
  } finally {
    device.close()
  }
  if (left > 0) throw new AppError('stillUnsent', { retry: true, context: { left } })
}

async function sendFor(person: Actor, ports: SyncPorts, tools: WipeTools): Promise<number> {
  const db = new PhoneDb(person.shopId, person.personId, tools.indexed)
  let begun: boolean = false
  try {
    const keys = await findSendKeys(db)
    if (keys === null || (await leftToSend(db)) === 0) return 0
    const sender = new PhoneSender({
      store: () => workerStore({ db, keys, person, ports }),
      db,
      keys,
      ports,
      shopId: person.shopId,
      onWipe: async () => {
        const of = { core: { db }, actor: person, why: 'handedOver', unsent: 0 } as const
        begun = await beginWipe(tools, of)
        return begun
      },
    })
    await sender.sendNow('background')
    sender.stop()
    return await leftToSend(db)
  } finally {
    db.close()
    if (begun) await resumeWipes(tools)
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
    openOp: (record) => openOp(keys.outbox, record),
    sender: { shopId: person.shopId, personId: person.personId, deviceId, pair: keys.device },
    pull: false,
    apply: async (answered: Answered): Promise<Applied> => {
      await applyOutcomes({ db, step }, answered)
      return { more: false, bookChanged: false, wasReset: false }
    },
    openPhoto:
      storeKey === null ? null : (hash, sealed) => openBytes(storeKey, photoPlace(hash), sealed),
    step,
  }
}
