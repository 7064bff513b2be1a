import * as z from 'zod/mini'
import type { Id } from '@/lib/model/id'
import { type Actor, actor } from '@/lib/model/person'
import { fail, ok, type Result } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { type EnrolRequest, enrolAnswer } from '@/lib/sync/protocol/device'
import { keep, readKeepsakes } from './keepsake'
import { publicKeyOf, type SendKeys } from './keys'
import { type PhoneDb, readMeta, writeMeta } from './phone-db'
import { readReply } from './reply'

export type EnrolProblem = { kind: 'unreachable' | 'signIn' | 'refused' }

const text = new TextEncoder()
/** A newer shop may say more of a person than this version knows. */
const me = z.object(actor.shape)

/** The device id of this store; made with the store, and the shop's word for it once enrolled. */
export async function deviceOf(
  db: PhoneDb,
  ports: SyncPorts,
): Promise<{ deviceId: Id; enrolled: boolean }> {
  const proposed = { deviceId: ports.ids.next(), enrolled: false }
  return await db.transaction('rw', db.meta, async () => {
    const held = await readMeta(db, 'device')
    if (held !== undefined) return held
    await writeMeta(db, 'device', proposed)
    return proposed
  })
}

/** Tells the shop this phone's public key (P18). Answers the device id; may be sent again at any time. */
export async function enrol(
  db: PhoneDb,
  keys: SendKeys,
  ports: SyncPorts,
): Promise<Result<Id, EnrolProblem>> {
  const device = await deviceOf(db, ports)
  const request: EnrolRequest = {
    deviceId: device.deviceId,
    publicKey: await publicKeyOf(keys),
    ...keptOf(ports, device.deviceId),
    words: (globalThis.navigator?.userAgent ?? '').slice(0, 120),
  }
  const sent = await ports.network.send({
    method: 'POST',
    path: '/api/devices',
    headers: { 'content-type': 'application/json' },
    body: text.encode(JSON.stringify(request)),
  })
  const reply = readReply(sent, ports.clock.now())
  if (reply.kind === 'signIn') return fail({ kind: 'signIn' })
  if (reply.kind === 'refused' || reply.kind === 'never') return fail({ kind: 'refused' })
  const answer = reply.kind === 'ours' ? enrolAnswer.safeParse(reply.json) : undefined
  if (answer?.success !== true) return fail({ kind: 'unreachable' })
  const { deviceId } = answer.data
  await writeMeta(db, 'device', { deviceId, enrolled: true })
  if (deviceId !== device.deviceId) keep(ports.keeper, device.deviceId, null)
  return ok(deviceId)
}

/** What is remembered of other stores than this one: those that are gone the shop sorts out (P22). */
function keptOf(ports: SyncPorts, own: Id): Pick<EnrolRequest, 'kept'> {
  const kept = readKeepsakes(ports.keeper).filter((one) => one.deviceId !== own)
  return kept.length === 0 ? {} : { kept }
}

/** Who the session says is at work. */
export async function askWho(ports: SyncPorts): Promise<Result<Actor, EnrolProblem>> {
  const sent = await ports.network.send({ method: 'GET', path: '/api/me' })
  const reply = readReply(sent, ports.clock.now())
  if (reply.kind === 'signIn') return fail({ kind: 'signIn' })
  if (reply.kind === 'refused') return fail({ kind: 'refused' })
  const read = reply.kind === 'ours' ? me.safeParse(reply.json) : undefined
  return read?.success === true ? ok(read.data) : fail({ kind: 'unreachable' })
}
