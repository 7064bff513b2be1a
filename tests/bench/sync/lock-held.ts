// B8: how long the product's transactions hold a shop's counter, under the real server.
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { Agent } from 'node:http'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { syncResponse } from '@/lib/sync/protocol/message'
import { makeRecords } from './records'
import { enrolled, opsOf, packed, post } from './sender'
import { makeCrew, type Stage, serveProduct, type Worker } from './stage'

/** Of one transaction: held in all, of it in our own process between statements, and waited before. */
export type Held = { heldMs: number; ownMs: number; waitMs: number; statements: number }
export type LockLoad = { name: string; devices: number; ops: number; rounds: number }

export const LOADS: LockLoad[] = [
  { name: 'one phone, 1 op', devices: 1, ops: 1, rounds: 200 },
  { name: '16 phones at once, 10 ops each', devices: 16, ops: 10, rounds: 20 },
  { name: '50 phones at once, 100 ops each', devices: 50, ops: 100, rounds: 4 },
  { name: 'one phone, 500 ops', devices: 1, ops: 500, rounds: 20 },
]

/** Runs each load on a shop of its own and answers what its transactions held. */
export async function measureLocks(
  stage: Pick<Stage, 'db'>,
  loads: readonly LockLoad[],
): Promise<{ load: LockLoad; held: Held[] }[]> {
  const folder = mkdtempSync(join(tmpdir(), 'farbench-lock-'))
  const file = join(folder, 'spans')
  const preload = fileURLToPath(new URL('./lock-watch.mjs', import.meta.url))
  const server = await serveProduct(stage.db, { preload, env: { BENCH_LOCK_FILE: file } })
  try {
    const told = []
    await run(server.base, { name: 'warm up', devices: 4, ops: 50, rounds: 5 })
    for (const load of loads) {
      await spansOf(file)
      const transactions = await run(server.base, load)
      const held = await spansOf(file)
      if (held.length < transactions)
        throw new Error(`${held.length} of ${transactions} spans seen`)
      told.push({ load, held })
    }
    return told
  } finally {
    await server.stop()
    rmSync(folder, { recursive: true, force: true })
  }
}

async function run(base: string, load: LockLoad): Promise<number> {
  const crew = await makeCrew(load.devices)
  const phones = await Promise.all(
    crew.map(async (worker) => ({ worker, device: await enrolled(worker) })),
  )
  const agent = new Agent({ keepAlive: false, maxSockets: load.devices })
  for (let round = 0; round < load.rounds; round += 1) {
    const requests = await Promise.all(
      phones.map(({ worker, device }, index) => {
        const records = recordsOf(worker, load.ops, round * 1000 + index)
        return packed(device.push(opsOf(device, records), { pull: false }))
      }),
    )
    const answers = await Promise.all(requests.map((request) => post(base, request, agent)))
    for (const { status, json } of answers) {
      if (status !== 200) throw new Error(`answered ${status}`)
      const odd = syncResponse.parse(json).results[0]
      if (odd !== undefined) throw new Error(`an op was ${JSON.stringify(odd)}`)
    }
  }
  agent.destroy()
  return load.devices * load.rounds
}

const recordsOf = ({ jobId, person }: Worker, count: number, seed: number) =>
  makeRecords({ count, kind: 'phrases', seed, jobId, authorId: person.id, untilMs: Date.now() })

/** The spans written so far; the next call answers only newer ones. */
async function spansOf(file: string): Promise<Held[]> {
  await new Promise((done) => setTimeout(done, 300))
  if (!existsSync(file)) return []
  const lines = readFileSync(file, 'utf8').split('\n').filter(Boolean)
  rmSync(file)
  return lines.map((line) => JSON.parse(line) as Held)
}
