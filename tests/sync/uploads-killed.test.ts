import { type ChildProcess, spawn } from 'node:child_process'
import { once } from 'node:events'
import { readFileSync, rmSync } from 'node:fs'
import { request as send } from 'node:http'
import { join } from 'node:path'
import { build } from 'esbuild'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { asShop } from '@/db/client'
import { findPhoto } from '@/db/queries/photos'
import { hashOf, photoBody, UploadWorld } from '../support/upload-world'

let up: UploadWorld
let child: ChildProcess | null = null
let port = 0
const folder = join(process.cwd(), '.data', `upload-server-${process.pid}`)
const program = join(folder, 'server.mjs')
const MINUTES_MS = 180_000
beforeAll(async () => {
  up = await UploadWorld.open()
  await build({
    entryPoints: ['tests/support/upload-server.ts'],
    outfile: program,
    bundle: true,
    platform: 'node',
    format: 'esm',
    packages: 'external',
    logLevel: 'error',
  })
})
afterAll(async () => {
  await kill()
  await up.world.close()
  rmSync(folder, { recursive: true, force: true })
})

/** A server in a process of its own, over the same database, stage and store. */
async function start(): Promise<void> {
  const mine = spawn(process.execPath, [program], {
    stdio: ['ignore', 'pipe', 'ignore'],
    env: process.env,
  })
  child = mine
  for await (const data of mine.stdout) {
    const found = /port (\d+)/.exec(String(data))?.[1]
    if (found === undefined) continue
    port = Number(found)
    return
  }
  throw new Error('the server did not start')
}

async function kill(): Promise<void> {
  const mine = child
  child = null
  if (!mine || mine.exitCode !== null || mine.signalCode !== null) return
  const gone = once(mine, 'exit')
  mine.kill('SIGKILL')
  await gone
}

type Said = { status: number; offset: number; stored: string | null }

/** Sends a request; `upTo` sends only so many bytes of its body and calls `cut` then. */
async function tell(
  request: Request,
  upTo?: { bytes: number; cut: () => Promise<void> },
): Promise<Said> {
  const body = Buffer.from(await request.arrayBuffer())
  const headers = { ...Object.fromEntries(request.headers), 'content-length': body.length }
  const path = new URL(request.url).pathname
  return await new Promise<Said>((resolve, reject) => {
    const going = send({ port, host: '127.0.0.1', method: request.method, path, headers })
    going.on('error', reject)
    going.on('response', (answer) => {
      answer.resume()
      resolve({
        status: answer.statusCode ?? 0,
        offset: Number(answer.headers['upload-offset']),
        stored: (answer.headers['x-farbench-stored'] as string | undefined) ?? null,
      })
    })
    if (upTo === undefined) going.end(body)
    else going.write(body.subarray(0, upTo.bytes), () => upTo.cut().catch(reject))
  })
}

describe('the server killed without a word', { timeout: MINUTES_MS }, () => {
  it('[fault 25] between chunks and inside one, loses nothing it has confirmed', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    await start()
    const chunk = (offset: number, length: number) =>
      up.device.chunk(hash, { offset, chunk: bytes.subarray(offset, offset + length) })
    expect(await tell(up.device.beginUpload(hash, bytes.length))).toMatchObject({ offset: 0 })
    expect(await tell(chunk(0, 65_536))).toMatchObject({ status: 204, offset: 65_536 })
    await kill()
    await start()
    expect(await tell(up.device.askUpload(hash))).toMatchObject({ status: 200, offset: 65_536 })
    const torn = tell(chunk(65_536, 65_536), { bytes: 30_000, cut: kill })
    await expect(torn).rejects.toThrow()
    await start()
    // What was not whole when it died was never believed.
    expect(await tell(up.device.beginUpload(hash, bytes.length))).toMatchObject({ offset: 65_536 })
    await tell(chunk(65_536, bytes.length))
    expect(await tell(up.device.askUpload(hash))).toMatchObject({ status: 200, stored: hash })
    expect(readFileSync(join(up.world.filesDir, up.world.a.id, hash)).equals(bytes)).toBe(true)
    await kill()
  })

  it('[fault 2] at any moment of the last chunk, ends in one stored file and one row', async () => {
    const bytes = up.another()
    const hash = hashOf(bytes)
    await up.name(photoBody(bytes))
    const whole = () => up.device.chunk(hash, { offset: 0, chunk: bytes })
    let stored = false
    for (const afterMs of [2, 15, 40, 90, 180]) {
      await start()
      const here = await tell(up.device.beginUpload(hash, bytes.length))
      stored ||= here.stored === hash
      if (here.offset === 0) {
        const sent = tell(whole()).catch(() => null)
        await new Promise((wait) => setTimeout(wait, afterMs))
        await kill()
        await sent
      } else await kill()
    }
    await start()
    const last = await tell(up.device.beginUpload(hash, bytes.length))
    if (last.stored === null) {
      const rest = bytes.subarray(last.offset)
      const end = await tell(up.device.chunk(hash, { offset: last.offset, chunk: rest }))
      stored ||= end.stored === hash
    } else stored = true
    expect(stored).toBe(true)
    expect(readFileSync(join(up.world.filesDir, up.world.a.id, hash)).equals(bytes)).toBe(true)
    expect(up.stored().filter((key) => key.startsWith(hash))).toHaveLength(3)
    const row = await asShop(up.world.a.id, (tx) => findPhoto(tx, hash))
    expect(row).toMatchObject({ hash, bytes: bytes.length })
    await kill()
  })
})
