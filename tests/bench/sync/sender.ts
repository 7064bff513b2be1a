// Devices without a store that send what a phone would, made before the clock starts.
import { createHash } from 'node:crypto'
import { type Agent, request as httpRequest } from 'node:http'
import { gunzipSync, gzipSync } from 'node:zlib'
import { asShop } from '@/db/client'
import { enrolDevice } from '@/db/queries/devices'
import type { Op } from '@/lib/sync/protocol/op'
import { logAdd } from '../../support/field-ops'
import { RawDevice } from '../../support/raw-device'
import type { BenchRecord } from './records'
import type { Worker } from './stage'

export type Packed = { path: string; headers: Record<string, string>; body: Buffer }
export type Told = { status: number; json: unknown; ms: number; bytes: number }

/** A new phone of that person, known to the shop. */
export async function enrolled(of: Worker): Promise<RawDevice> {
  const device = new RawDevice({ shopId: of.shop.id, personId: of.person.id })
  await asShop(of.shop.id, (tx) =>
    enrolDevice(tx, {
      id: device.id,
      personId: of.person.id,
      name: 'Bench phone',
      publicKey: device.publicKey,
      enrolledAt: new Date().toISOString(),
    }),
  )
  return device
}

/** The records as ops of that device, as the phone's store makes them: an entry's op goes by its id. */
export const opsOf = (device: RawDevice, records: readonly BenchRecord[]): Op[] =>
  records.map((record) => {
    const { id, jobId, happenedAt, body } = record
    const at = { id, happenedAt, writtenAt: happenedAt }
    return { ...device.op(logAdd(device, jobId, body, at)), id }
  })

/** A request of the device, ready to be sent as often as wanted. */
export async function packed(request: Request): Promise<Packed> {
  return {
    path: new URL(request.url).pathname,
    headers: { ...Object.fromEntries(request.headers), 'accept-encoding': 'gzip' },
    body: Buffer.from(await request.arrayBuffer()),
  }
}

/** A request to the floor. */
export function floorPacked(path: string, message: unknown, headers: Record<string, string> = {}) {
  const body = gzipSync(JSON.stringify(message))
  const plain = { 'content-encoding': 'gzip', 'content-type': 'application/json' }
  return { path, headers: { ...plain, 'accept-encoding': 'gzip', ...headers }, body }
}

/** Sends it and reads the whole answer; `ms` ends with its last byte. */
export function post(base: string, of: Packed, agent: Agent): Promise<Told> {
  const began = performance.now()
  return new Promise((resolve, reject) => {
    const sent = httpRequest(
      `${base}${of.path}`,
      {
        agent,
        method: 'POST',
        headers: { ...of.headers, 'content-length': String(of.body.byteLength) },
      },
      (answer) => {
        const parts: Buffer[] = []
        answer.on('data', (part: Buffer) => parts.push(part))
        answer.on('error', reject)
        answer.on('end', () => {
          const ms = performance.now() - began
          const raw = Buffer.concat(parts)
          const isPacked = answer.headers['content-encoding'] === 'gzip'
          const text = (isPacked ? gunzipSync(raw) : raw).toString('utf8')
          const json: unknown = text === '' ? null : JSON.parse(text)
          resolve({ status: answer.statusCode ?? 0, json, ms, bytes: raw.byteLength })
        })
      },
    )
    sent.on('error', reject)
    sent.end(of.body)
  })
}

/** SHA-256 of a text, for keys of things made once. */
export const hashOf = (text: string | Buffer): string =>
  createHash('sha256').update(text).digest('hex')
