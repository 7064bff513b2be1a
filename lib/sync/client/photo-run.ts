import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { Sender } from './envelope'
import { type PhoneDb, type PhotoRecord, readMeta, sealedPhoto } from './phone-db'
import { afterChunk, afterCut, chunkOf, type Pace } from './photo-pace'
import { markStored } from './photo-store'
import { askUpload, beginUpload, sendChunk, type UploadReply } from './photo-upload'
import { endOf, type RunEnd } from './run-end'

/** What sending photos needs of a store. */
export type PhotoStore = {
  db: PhoneDb
  sender: Sender
  /** Opens sealed bytes of a photo; null when this sender cannot open photos. */
  openPhoto: ((hash: string, sealed: Uint8Array<ArrayBuffer>) => Promise<ArrayBuffer>) | null
  step(name: string): void
}

type Open = { hash: string; bytes: ArrayBuffer | null; offset: number | null; turns: number }

/** How often in one run an upload may be begun anew or asked for before it waits for the next run. */
const MOST_TURNS = 8

/**
 * The photos of one run, one request at a time (PH3): the caller looks for new records before each. Where
 * an upload stands is the shop's to say: it is asked at the start and after every doubt, so that a kill,
 * a restart or a new sign-in goes on where it stood. Bytes leave the phone's store only after the shop
 * confirmed the hash (PH4).
 */
export class PhotoRun {
  waits: boolean = false
  readonly #store: PhotoStore
  readonly #ports: SyncPorts
  readonly #pace: Pace
  /** Not tried again in this run. */
  readonly #held = new Set<string>()
  /** What is known for sure of the upload under way, and its opened bytes. */
  #open: Open | null = null

  constructor(store: PhotoStore, ports: SyncPorts, pace: Pace) {
    this.#store = store
    this.#ports = ports
    this.#pace = pace
  }

  /**
   * One request for the photo that has waited longest: `moved`, `over` when that photo is done with in
   * this run, an end of the run, or null when no photo is left.
   */
  async next(): Promise<RunEnd | 'moved' | 'over' | null> {
    const photo = await this.#oldest()
    if (photo === undefined) return null
    const open = await this.#opened(photo)
    this.#store.step('beforePhoto')
    const reply = await this.#ask(photo, open)
    this.#store.step('afterPhoto')
    return await this.#heard(photo, open, reply)
  }

  async #oldest(): Promise<PhotoRecord | undefined> {
    const { db, openPhoto } = this.#store
    if (openPhoto === null) return undefined
    const waiting = await db.photo.where('state').equals('waiting').sortBy('since')
    return waiting.find((photo) => !this.#held.has(photo.hash))
  }

  async #opened(photo: PhotoRecord) {
    if (this.#open?.hash === photo.hash) return this.#open
    const { db, openPhoto } = this.#store
    const sealed = await sealedPhoto(db, photo)
    const bytes = sealed && openPhoto ? await openPhoto(photo.hash, sealed) : null
    this.#open = { hash: photo.hash, bytes, offset: null, turns: 0 }
    return this.#open
  }

  async #ask(photo: PhotoRecord, open: Open): Promise<UploadReply> {
    const { sender } = this.#store
    const { hash, size } = photo
    const isBegun = typeof photo.uploaded === 'number'
    if (!isBegun) return await beginUpload(this.#ports, sender, { hash, size })
    if (open.offset === null || open.bytes === null)
      return await askUpload(this.#ports, sender, hash)
    const { offset, bytes } = open
    const chunk = new Uint8Array(bytes.slice(offset, offset + chunkOf(this.#pace)))
    const startMs = this.#ports.clock.now()
    const reply = await sendChunk(this.#ports, sender, { hash, offset, chunk })
    const ms = this.#ports.clock.now() - startMs
    this.#pace.chunkBytes =
      reply.kind === 'unreachable'
        ? afterCut(this.#pace, ms)
        : afterChunk(this.#pace, { bytes: chunk.byteLength, ms })
    return reply
  }

  /** The time by the shop's clock, ms: the phone's own may be off by days. */
  async #shopNow(): Promise<number> {
    return this.#ports.clock.now() + ((await readMeta(this.#store.db, 'clockOffset')) ?? 0)
  }

  async #heard(
    photo: PhotoRecord,
    open: Open,
    reply: UploadReply,
  ): Promise<RunEnd | 'moved' | 'over'> {
    const { db } = this.#store
    const { hash, size } = photo
    switch (reply.kind) {
      case 'stored':
        await markStored(this.#store, photo, await this.#shopNow())
        this.#store.step('photoOver')
        return this.#over(hash)
      case 'at':
        return await this.#stands(photo, open, Math.min(reply.offset, size))
      case 'mismatch':
        return this.#turn(open)
      case 'gone':
        await db.photo.update(hash, { uploaded: null })
        return this.#turn(open)
      case 'never':
      case 'smaller': {
        const reason = reply.kind === 'never' ? reply.code : 'too_big'
        await db.photo.update(hash, { state: 'stuck', reason, uploaded: null })
        return this.#over(hash)
      }
      case 'later':
        // One photo that has to wait does not hold up the others.
        this.waits = true
        return this.#over(hash)
      default:
        open.offset = null
        return endOf(reply)
    }
  }

  async #stands(photo: PhotoRecord, open: Open, offset: number): Promise<'moved' | 'over'> {
    const { db } = this.#store
    if (open.bytes === null) {
      // The shop was restored from a backup and has lost what it had confirmed.
      await db.photo.update(photo.hash, { state: 'stuck', reason: 'bytesGone' })
      return this.#over(photo.hash)
    }
    const hasMoved = open.offset === null || offset > open.offset
    open.offset = offset
    await db.photo.update(photo.hash, { uploaded: offset })
    return hasMoved ? 'moved' : this.#turn(open)
  }

  /** Asks anew, some times; a line that leads in circles has to wait. */
  #turn(open: Open): 'moved' | 'over' {
    open.offset = null
    open.turns += 1
    if (open.turns < MOST_TURNS) return 'moved'
    this.waits = true
    return this.#over(open.hash)
  }

  #over(hash: string): 'over' {
    this.#held.add(hash)
    this.#open = null
    return 'over'
  }
}
