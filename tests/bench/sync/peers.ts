// The peers: installed apart (tests/bench/peers), only when asked for.
import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { BenchRecord } from './records'
import { type Served, serve } from './serve'

const FOLDER = join(process.cwd(), 'tests', 'bench', 'peers')

export type Peers = { bases: Record<string, string>; close(): Promise<void> }

/** Starts both peers' servers; their packages must be installed. */
export async function openPeers(databaseUrl: string): Promise<Peers> {
  const served: [string, Served][] = []
  const close = async () => {
    await Promise.all(served.map(([, one]) => one.stop()))
  }
  try {
    for (const [name, path] of [
      ['rxdb', '/pull?shop=none&limit=1'],
      ['pouchdb', '/'],
    ] as const) {
      const args = (port: number) => ['server.mjs', name, String(port)]
      const env = () => ({ PEER_DATABASE_URL: databaseUrl })
      served.push([name, await serve({ args, path, env, cwd: FOLDER })])
    }
  } catch (error) {
    await close()
    throw error
  }
  return { bases: Object.fromEntries(served.map(([name, { base }]) => [name, base])), close }
}

/** One storm of PouchDB's own clients, in a process of their own. */
export async function pouchStorm(
  base: string,
  devices: readonly { shop: string; records: BenchRecord[] }[],
): Promise<{ wholeMs: number; eachMs: number[] }> {
  const folder = mkdtempSync(join(tmpdir(), 'farbench-storm-'))
  const file = join(folder, 'devices.json')
  writeFileSync(file, JSON.stringify(devices))
  const child = spawn(process.execPath, ['storm.mjs', base, file], {
    cwd: FOLDER,
    stdio: ['ignore', 'pipe', 'inherit'],
  })
  let text = ''
  child.stdout.on('data', (data) => {
    text += data
  })
  const [code] = await once(child, 'close')
  rmSync(folder, { recursive: true, force: true })
  if (code !== 0) throw new Error(`storm.mjs ended with ${code}`)
  return JSON.parse(text)
}
