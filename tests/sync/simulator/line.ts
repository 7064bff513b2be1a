// The line between a phone and the shop's real route handlers, with everything that can happen on it.
import { gunzipSync, gzipSync } from 'node:zlib'
import { signedHeaders } from '@/lib/sync/client/envelope'
import { HEADERS } from '@/lib/sync/protocol/device'
import type { Op } from '@/lib/sync/protocol/op'
import { fullOp } from '@/lib/sync/protocol/short'
import { RealShop } from '../../support/real-shop'
import type { Draw } from './draw'
import type { Handset, Tab } from './handset'
import { MAKERS } from './op-makers'
import { type DatabaseFault, through } from './statements'
import type { World } from './world'

/** What goes wrong with one request. */
type LineFault =
  | 'none'
  | 'lost'
  | 'answerLost'
  | 'answerCut'
  | 'twice'
  | 'late'
  | 'tooSlow'
  | 'portal'
  | 'bitFlip'
  | 'status500'
  | 'status429'
  | 'status413'
  | DatabaseFault['kind']

const FAULTS: readonly { fault: LineFault; weight: number }[] = [
  { fault: 'lost', weight: 4 },
  { fault: 'answerLost', weight: 6 },
  { fault: 'answerCut', weight: 1 },
  { fault: 'twice', weight: 3 },
  { fault: 'late', weight: 3 },
  { fault: 'tooSlow', weight: 1 },
  { fault: 'portal', weight: 1 },
  { fault: 'bitFlip', weight: 1 },
  { fault: 'status500', weight: 1 },
  { fault: 'status429', weight: 1 },
  { fault: 'status413', weight: 1 },
  { fault: 'poolExhausted', weight: 1 },
  { fault: 'lockTimeout', weight: 2 },
  { fault: 'backendKilled', weight: 3 },
  { fault: 'answerOfCommitLost', weight: 3 },
]

/** Most requests of one step: a sender that does not come to an end is a bug. */
const MOST_REQUESTS = 400

/** One request as it left a phone. */
export type Sent = {
  path: string
  method: string
  headers: Record<string, string>
  body: Uint8Array<ArrayBuffer> | null
  cookie: string | null
}

/** The op numbers that a request says it holds. */
const headerOf = ({ headers }: Sent, name: string) => new Headers(headers).get(name)
const numbersOf = (sent: Sent): string => headerOf(sent, HEADERS.dseq) ?? '-'

/** What a tab's fetch does. */
export async function send(
  world: World,
  handset: Handset,
  tab: Tab,
  path: string,
  init: RequestInit,
): Promise<Response> {
  await world.stage.gate(tab.actor, `send ${path.slice(0, 12)}`)
  if (!handset.signal) throw new TypeError('no signal')
  const sent = await inOldWords(handset, tab, {
    path,
    method: init.method ?? 'GET',
    headers: { ...(init.headers as Record<string, string> | undefined) },
    body: init.body ? Uint8Array.from(init.body as Uint8Array) : null,
    cookie: handset.cookie,
  })
  world.count('requests')
  world.requests += 1
  if (world.requests > MOST_REQUESTS) {
    world.broken('runsEnd', `${handset.name} goes on asking for ${path}`)
    handset.signal = false
    throw new TypeError('no signal')
  }
  const answer = await underFault(world, tab, sent, drawFault(world, sent))
  if (init.signal?.aborted) throw new TypeError('took too long')
  await world.stage.gate(tab.actor, 'answer')
  if (!handset.signal) throw new TypeError('no signal')
  return answer
}

function drawFault({ draw, faultShare }: World, sent: Sent): LineFault {
  if (!draw.chance(faultShare)) return 'none'
  const { fault } = draw.weighted(FAULTS)
  // A shop says 413 to what is too much at once, never to one op.
  const [first, last] = numbersOf(sent).split('-')
  return fault === 'status413' && (first === last || !first) ? 'lost' : fault
}

async function underFault(world: World, tab: Tab, sent: Sent, fault: LineFault): Promise<Response> {
  if (fault !== 'none') world.fault(fault)
  const reach = (database: DatabaseFault | null = null) => deliver(world, tab, sent, database)
  const { draw } = world
  switch (fault) {
    case 'none':
      return await reach()
    case 'lost':
      throw new TypeError('lost on the way')
    case 'answerLost':
      await reach()
      throw new TypeError('answer lost')
    case 'answerCut':
      return await cutShort(await reach(), draw)
    case 'twice':
      await reach()
      return await reach()
    case 'late':
      world.late.push(sent)
      throw new TypeError('held up on the way')
    case 'tooSlow':
      if (draw.chance(0.5)) await reach()
      world.truth.pass(200_000)
      throw new TypeError('took too long')
    case 'portal':
      return new Response('<html>Welcome</html>', { headers: { 'content-type': 'text/html' } })
    case 'bitFlip':
      return await deliver(world, tab, flipped(sent, draw), null)
    case 'status500':
      return new Response('broken', { status: 500 })
    case 'status429':
      return new Response('wait', { status: 429, headers: { 'retry-after': '7' } })
    case 'status413':
      return new Response('too much', { status: 413 })
    case 'backendKilled':
      return await reach({ kind: fault, at: draw.between(1, 40) })
    case 'answerOfCommitLost':
      return await reach({ kind: fault, at: draw.between(1, 3) })
    default:
      return await reach({ kind: fault })
  }
}

/** Hands a request to the shop. A handler that throws is a bug, whatever happened to the database. */
export async function deliver(
  world: World,
  tab: Pick<Tab, 'actor'> | null,
  sent: Sent,
  fault: DatabaseFault | null,
): Promise<Response> {
  const init: RequestInit = { method: sent.method, headers: sent.headers }
  if (sent.body !== null) init.body = sent.body
  const passage = { actor: tab?.actor, fault, count: 0, commits: 0 }
  try {
    return await through(passage, () => new RealShop(sent.cookie).fetch(sent.path, init))
  } catch (cause) {
    world.broken('serverBroke', `${sent.method} ${sent.path}: ${String(cause)}`, cause)
    return new Response('broken', { status: 500 })
  }
}

async function cutShort(answer: Response, draw: Draw): Promise<Response> {
  const text = await answer.text()
  return new Response(text.slice(0, draw.below(Math.max(1, text.length - 1))), {
    status: answer.status,
    headers: answer.headers,
  })
}

function flipped(sent: Sent, draw: Draw): Sent {
  if (sent.body === null || sent.body.length === 0) return sent
  const body = Uint8Array.from(sent.body)
  const at = draw.below(body.length)
  body[at] = (body[at] ?? 0) ^ (1 << draw.below(8))
  return { ...sent, body }
}

/** The schema an op was first sent under; it never changes, whatever app sends it again. */
function schemaOf(handset: Handset, op: Op): number {
  const first = handset.schemaOf.get(op.id)
  if (first !== undefined) return first
  const isNew = MAKERS.some((maker) => maker.kind === op.kind && maker.since === 2)
  const schema = handset.protocol === 'before' && !isNew ? 1 : op.schema
  handset.schemaOf.set(op.id, schema)
  return schema
}

/**
 * An older app: the same request in the words of the protocol and schema before, signed anew with the
 * phone's own key. Ops it made keep their old schema also after its update.
 */
async function inOldWords(handset: Handset, tab: Tab, sent: Sent): Promise<Sent> {
  const speaks = handset.protocol
  if (sent.path !== '/api/sync' || sent.body === null) return sent
  if (!handset.hasBeenOld) return sent
  const message = JSON.parse(gunzipSync(sent.body).toString()) as Record<string, unknown>
  const said = { dev: headerOf(sent, HEADERS.device) ?? '', personId: tab.phone.actor.personId }
  const full = (message.ops as unknown[]).map((op) => fullOp(op, said) as Op)
  const ops = full.map((op) => ({ ...op, schema: schemaOf(handset, op) }))
  const { held, canary, brief, ...old } = message
  const versions = { before: { ...old, protocol: 1, schema: 1 }, ancient: { ...old, protocol: 0 } }
  const words = speaks === 'now' ? message : versions[speaks]
  const body = Uint8Array.from(gzipSync(JSON.stringify({ ...words, ops })))
  const dseq = numbersOf(sent)
  const { actor, core } = tab.phone
  const sender = {
    shopId: actor.shopId,
    personId: actor.personId,
    deviceId: headerOf(sent, HEADERS.device) ?? '',
    pair: core.keys.device,
  }
  return {
    ...sent,
    body,
    headers: { ...sent.headers, ...(await signedHeaders(sender, dseq, body)) },
  }
}
