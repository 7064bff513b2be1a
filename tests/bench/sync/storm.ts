// B7: 50 devices reconnect at the same moment with 100 records each, of 50 shops and of one shop. What they
// send is made beforehand, so that the servers are measured; PouchDB's clients cannot be, and run in a
// process of their own.
import { Agent } from 'node:http'
import { z } from 'zod'
import { syncResponse } from '@/lib/sync/protocol/message'
import { quantile, turnOrder } from './figures'
import { pouchStorm } from './peers'
import { type BenchRecord, makeRecords } from './records'
import { enrolled, floorPacked, opsOf, type Packed, packed, post, type Told } from './sender'
import { makeCrew, type Stage, type Worker } from './stage'

export const CROWDS = ['50 shops', 'one shop'] as const
export type Crowd = (typeof CROWDS)[number]
/** One storm: until the last device was done, each device's own time, and requests sent again. */
export type Storm = {
  arm: string
  crowd: Crowd
  turn: number
  wholeMs: number
  eachMs: number[]
  again: number
}

export const DEVICES = 50
const RECORDS = 100

/** Runs `turns` turns of every arm and crowd, in turns. */
export async function measureStorms(
  stage: Stage,
  of: {
    turns: number
    devices?: number
    peers: Record<string, string>
    say(words: string): void
  },
): Promise<Storm[]> {
  const devices = of.devices ?? DEVICES
  const storms: Storm[] = []
  const bases = { product: stage.product.base, floor: stage.floor.base, ...of.peers }
  const plans = CROWDS.flatMap((crowd) =>
    Object.entries(bases).map(([arm, base]) => ({ arm, base, crowd })),
  )
  for (let turn = -1; turn < of.turns; turn += 1) {
    for (const { arm, base, crowd } of turnOrder(plans, turn + 1)) {
      const crew = await crewOf(crowd, devices)
      const loads = crew.map((worker, index) => ({
        worker,
        records: recordsOf(worker, turn * 1000 + index),
      }))
      const storm = await stormOf(arm, base, loads)
      if (turn >= 0) storms.push({ arm, crowd, turn, ...storm })
    }
    of.say(`storm turn ${turn + 1} of ${of.turns}`)
  }
  return storms
}

/** The people of one storm, each with a job of their own. */
export async function crewOf(crowd: Crowd, devices: number): Promise<Worker[]> {
  if (crowd === 'one shop') return await makeCrew(devices)
  const crew: Worker[] = []
  for (let at = 0; at < devices; at += 1) crew.push(...(await makeCrew(1)))
  return crew
}

type Load = { worker: Worker; records: BenchRecord[] }

const recordsOf = ({ jobId, person }: Worker, seed: number): BenchRecord[] =>
  makeRecords({
    count: RECORDS,
    kind: 'phrases',
    seed,
    jobId,
    authorId: person.id,
    untilMs: Date.now(),
  })

async function stormOf(arm: string, base: string, loads: readonly Load[]) {
  if (arm === 'pouchdb') {
    const devices = loads.map(({ worker, records }) => ({ shop: worker.shop.id, records }))
    return { ...(await pouchStorm(base, devices)), again: 0 }
  }
  const requests = await Promise.all(loads.map((load) => requestOf(arm, load)))
  return await unleash(base, requests, (told) => left(arm, told))
}

async function requestOf(arm: string, { worker, records }: Load): Promise<Packed> {
  if (arm === 'floor') return floorPacked('/api/push', { shop: worker.shop.id, records })
  if (arm === 'rxdb') {
    const rows = records.map((record) => ({ newDocumentState: { ...record, _deleted: false } }))
    const body = Buffer.from(JSON.stringify(rows))
    const headers = { 'content-type': 'application/json' }
    return { path: `/push?shop=${worker.shop.id}`, headers, body }
  }
  const device = await enrolled(worker)
  return await packed(device.push(opsOf(device, records), { pull: false }))
}

const floorAnswer = z.object({ taken: z.number() })

/** How many of the device's records the answer leaves to be sent again. */
function left(arm: string, told: Told): number {
  if (told.status !== 200) return RECORDS
  if (arm === 'floor') return RECORDS - floorAnswer.parse(told.json).taken
  if (arm === 'rxdb') return z.array(z.unknown()).parse(told.json).length
  const { results } = syncResponse.parse(told.json)
  const odd = results.filter(({ result }) => result !== 'duplicate' && result !== 'retry')
  if (odd.length > 0) throw new Error(`a record was ${JSON.stringify(odd[0])}`)
  return results.filter(({ result }) => result === 'retry').length
}

/** Sends all at once, each over a connection of its own, again until nothing is left. */
export async function unleash(
  base: string,
  requests: readonly Packed[],
  leftOf: (told: Told) => number,
): Promise<{ wholeMs: number; eachMs: number[]; again: number }> {
  const agent = new Agent({ keepAlive: false, maxSockets: requests.length })
  let again = 0
  const began = performance.now()
  const eachMs = await Promise.all(
    requests.map(async (request) => {
      while (leftOf(await post(base, request, agent)) > 0) {
        again += 1
        await new Promise((done) => setTimeout(done, 1000 + Math.random() * 1000))
      }
      return performance.now() - began
    }),
  )
  return { wholeMs: performance.now() - began, eachMs, again }
}

/** The slowest twentieth against the middle: fairness among the devices of one storm. */
export const unfairness = ({ eachMs }: Storm): number =>
  quantile(eachMs, 0.95) / quantile(eachMs, 0.5)
