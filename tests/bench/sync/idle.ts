// B4: an exchange with nothing to tell, against a route behind the same handler that unpacks, parses and
// runs the one statement of a pull; once without and once with the check of a signature.
import { generateKeyPairSync, sign } from 'node:crypto'
import { Agent } from 'node:http'
import { sql } from 'kysely'
import { v7 } from 'uuid'
import { syncResponse } from '@/lib/sync/protocol/message'
import type { RawDevice } from '../../support/raw-device'
import { turnOrder } from './figures'
import { enrolled, floorPacked, type Packed, packed, post, type Told } from './sender'
import { cookieOf, makeCrew, type Stage, type Worker } from './stage'

export type IdleArm = 'product' | 'signedFloor' | 'floor'
/** Milliseconds of every request, by arm, one list for each turn; and the bytes of one exchange. */
export type Idle = { turns: Record<IdleArm, number[]>[]; bytes: { up: number; down: number } }

const PHONES = 8

/** Runs `turns` turns of `each` requests an arm, one at a time over one open connection. */
export async function measureIdle(
  stage: Stage,
  of: { turns: number; each: number },
): Promise<Idle> {
  const [worker] = (await makeCrew(1)) as [Worker]
  const { name, value } = await cookieOf(worker)
  const cookie = `${name}=${value}`
  const agent = new Agent({ keepAlive: true, maxSockets: 1 })
  const phones = await Promise.all(Array.from({ length: PHONES }, () => enrolled(worker)))
  for (const phone of phones) await catchUp(stage, phone, cookie, agent)
  const signedFloor = await signedIdle(stage, worker)
  const floor = floorPacked('/api/idle', { shop: worker.shop.id, seq: 0, clientTime: now() })
  const sources: Source[] = [
    { arm: 'product', base: stage.product.base, next: idleOf(phones, cookie) },
    { arm: 'signedFloor', base: stage.floor.base, next: () => Promise.resolve(signedFloor) },
    { arm: 'floor', base: stage.floor.base, next: () => Promise.resolve(floor) },
  ]
  const told: Idle = { turns: [], bytes: { up: 0, down: 0 } }
  // The first turn warms everybody up.
  await oneTurn({ sources, agent, each: of.each, turn: 0 })
  for (let turn = 0; turn < of.turns; turn += 1) {
    const { taken, bytes } = await oneTurn({ sources, agent, each: of.each, turn })
    told.turns.push(taken)
    told.bytes = bytes
  }
  agent.destroy()
  return told
}

type Source = { arm: IdleArm; base: string; next(): Promise<Packed> }

/** `each` requests of every arm, one after the other, another arm first each time. */
async function oneTurn(of: { sources: Source[]; agent: Agent; each: number; turn: number }) {
  const taken: Record<IdleArm, number[]> = { product: [], signedFloor: [], floor: [] }
  let bytes = { up: 0, down: 0 }
  for (let at = 0; at < of.each; at += 1) {
    for (const { arm, base, next } of turnOrder(of.sources, of.turn + at)) {
      const request = await next()
      const told = await post(base, request, of.agent)
      if (told.status !== 200) throw new Error(`${arm} answered ${told.status}`)
      if (arm === 'product') bytes = { up: request.body.byteLength, down: told.bytes }
      taken[arm].push(told.ms)
    }
  }
  return { taken, bytes }
}

/** Idle exchanges of the phones in turn: one may ask 240 times a minute. */
function idleOf(phones: readonly RawDevice[], cookie: string): () => Promise<Packed> {
  let next = 0
  return async () => {
    next += 1
    return await packed(phones[next % PHONES]!.push([], { cookie }))
  }
}

const now = () => new Date().toISOString()

async function catchUp(stage: Stage, phone: RawDevice, cookie: string, agent: Agent) {
  const told: Told = await post(stage.product.base, await packed(phone.push([], { cookie })), agent)
  const { pull } = syncResponse.parse(told.json)
  if (pull.kind !== 'page' || pull.more) throw new Error(`pull answered ${pull.kind}`)
  phone.cursor = pull.cursor
}

async function signedIdle(stage: Stage, worker: Worker): Promise<Packed> {
  const { privateKey, publicKey } = generateKeyPairSync('ec', { namedCurve: 'P-256' })
  const device = v7()
  const jwk = JSON.stringify(publicKey.export({ format: 'jwk' }))
  await sql`insert into floor_key values (${device}, ${jwk}::jsonb)`.execute(stage.db.owner)
  const made = floorPacked('/api/idle', { shop: worker.shop.id, seq: 0, clientTime: now() })
  const key = { key: privateKey, dsaEncoding: 'ieee-p1363' } as const
  const signature = sign('sha256', made.body, key).toString('base64url')
  const headers = { 'x-floor-device': device, 'x-floor-signature': signature }
  return { ...made, headers: { ...made.headers, ...headers } }
}
