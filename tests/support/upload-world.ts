// An upload seen from the line: a phone of one shop, its job, and the real handlers of an upload.
import { createHash } from 'node:crypto'
import { existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import sharp from 'sharp'
import { HEAD, PATCH } from '@/app/api/photos/tus/[hash]/route'
import { POST } from '@/app/api/photos/tus/route'
import type { LogBody } from '@/lib/model/log-entry'
import { jobOpen, logAdd } from './field-ops'
import type { RawDevice } from './raw-device'
import { openSyncWorld, phoneOf, type SyncWorld, sync } from './sync-world'

/** A picture of `edge` pixels a side that does not compress well. */
export async function noisyPicture(edge: number): Promise<Buffer> {
  const raw = Buffer.alloc(edge * edge * 3)
  let seed = 7
  for (let at = 0; at < raw.length; at++) {
    seed = (seed * 1_103_515_245 + 12_345) % 2_147_483_648
    raw[at] = seed >> 16
  }
  return await sharp(raw, { raw: { width: edge, height: edge, channels: 3 } })
    .jpeg({ quality: 90 })
    .toBuffer()
}

export const hashOf = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')
export const at = (hash: string) => ({ params: Promise.resolve({ hash }) })

type Claims = { mime?: 'image/jpeg' | 'image/png'; bytes?: number }
export const photoBody = (bytes: Buffer, claims: Claims = {}): LogBody => ({
  kind: 'photo',
  photo: {
    hash: hashOf(bytes),
    bytes: claims.bytes ?? bytes.length,
    mime: claims.mime ?? 'image/jpeg',
    width: 1,
    height: 1,
  },
  caption: null,
})
export const voiceBody = (bytes: Buffer): LogBody => ({
  kind: 'voice',
  voice: { hash: hashOf(bytes), bytes: bytes.length, mime: 'audio/webm', seconds: 22 },
  caption: null,
})

/** What an answer of an upload says. */
export const said = (answer: Response) => ({
  status: answer.status,
  offset: Number(answer.headers.get('upload-offset')),
  stored: answer.headers.get('x-farbench-stored'),
  problem: answer.headers.get('x-farbench-problem'),
})

/** The world with a mechanic's phone in it, one job, and what the phone asks of the shop. */
export class UploadWorld {
  readonly world: SyncWorld
  readonly device: RawDevice
  readonly cookie: string
  readonly job: string
  readonly #photo: Buffer
  #count = 0

  static async open(): Promise<UploadWorld> {
    const world = await openSyncWorld()
    const { device, cookie } = await phoneOf(world.a, 'mechanic')
    const opening = jobOpen(world.a.machineId)
    await sync(device, [device.op(opening)])
    return new UploadWorld(
      { world, device, cookie, job: opening.fields.id },
      await noisyPicture(400),
    )
  }

  private constructor(of: Pick<UploadWorld, 'world' | 'device' | 'cookie' | 'job'>, photo: Buffer) {
    this.world = of.world
    this.device = of.device
    this.cookie = of.cookie
    this.job = of.job
    this.#photo = photo
  }

  /** A picture unlike any other: what stands behind its end changes the hash alone. */
  another(): Buffer {
    this.#count += 1
    return Buffer.concat([this.#photo, Buffer.from(`upload ${this.#count}`)])
  }

  /** Sends the entry that names a file. */
  name(body: LogBody, from = this.device) {
    return sync(from, [from.op(logAdd(from, this.job, body))])
  }

  begin(bytes: Buffer, from = this.device) {
    return POST(from.beginUpload(hashOf(bytes), bytes.length))
  }

  ask(bytes: Buffer, from = this.device) {
    return HEAD(from.askUpload(hashOf(bytes)), at(hashOf(bytes)))
  }

  add(bytes: Buffer, span: { offset: number; length: number }, from = this.device) {
    const hash = hashOf(bytes)
    const chunk = bytes.subarray(span.offset, span.offset + span.length)
    return PATCH(from.chunk(hash, { offset: span.offset, chunk }), at(hash))
  }

  async sendAll(bytes: Buffer, length: number, from = this.device) {
    let last = await this.begin(bytes, from)
    while (last.ok && said(last).offset < bytes.length) {
      last = await this.add(bytes, { offset: said(last).offset, length }, from)
    }
    return last
  }

  /** Keys of the shop's objects, and names in the stage. */
  stored = () => {
    const folder = join(this.world.filesDir, this.world.a.id)
    return existsSync(folder) ? readdirSync(folder).sort() : []
  }
  staged = () => readdirSync(this.world.stageDir).sort()
  stageOf = (bytes: Buffer) =>
    join(this.world.stageDir, `${this.world.a.id}.${this.device.owner.personId}.${hashOf(bytes)}`)
}
