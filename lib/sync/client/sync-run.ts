import type { SyncPorts } from '@/lib/ports/sync-ports'
import { type SyncResponse, syncResponse } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import { type Answered, type Applied, setAside } from './answer'
import { openOp } from './core'
import { packRequest, type Sender, signedHeaders } from './envelope'
import { measureOffset } from './hlc'
import { type OutboxRecord, type PhoneDb, type PhotoRecord, readMeta, writeMeta } from './phone-db'
import { markPhoto, nextPhoto, sendPhoto } from './photo-upload'
import { type Reply, readReply } from './reply'
import type { Need } from './views'

/** What a run needs of a store; the worker's has no rows and perhaps no photos. */
export type RunStore = {
  db: PhoneDb
  outboxKey: CryptoKey
  sender: Sender
  pull: boolean
  apply(answered: Answered): Promise<Applied>
  /** Null when this sender cannot open photos. */
  openPhoto: ((photo: PhotoRecord) => Promise<ArrayBuffer>) | null
  step(name: string): void
}

export type Progress = { done: number; total: number }

/** How a run ended. `wait`: not everything went; try again after a while. */
export type RunEnd =
  | { kind: 'done' }
  | { kind: 'unreachable' }
  | { kind: 'wait'; afterMs: number | null }
  | { kind: 'enrol' }
  | { kind: 'need'; need: Exclude<Need, null> }

/** Most ops of one request, between runs: halved when one fails, doubled when one goes (P15). */
export type BatchSize = { limit: number }

const FULL = 500
const LEAST = 25
/** A try that failed sooner met no line at all (a choice). */
const UNDER_WAY_MS = 2_000
const MOST_RESETS = 2

/**
 * One run: records first, oldest first, with the pull in the same request (P3); then photos, one at a
 * time, each time looking for new records before the next. It ends when nothing is left to do.
 */
export class SyncRun {
  bookChanged: boolean = false
  #need: Need = null
  #waits: boolean = false
  #upToDate: boolean
  #resets = 0
  /** Sent in this run without being taken: not sent again in it. */
  readonly #heldOps = new Set<number>()
  readonly #heldPhotos = new Set<string>()
  readonly #store: RunStore
  readonly #ports: SyncPorts
  readonly #size: BatchSize
  readonly #tell: (progress: Progress) => void
  #progress: Progress = { done: 0, total: 0 }

  constructor(of: {
    store: RunStore
    ports: SyncPorts
    size: BatchSize
    tell: (progress: Progress) => void
  }) {
    this.#store = of.store
    this.#ports = of.ports
    this.#size = of.size
    this.#tell = of.tell
    this.#upToDate = !of.store.pull
  }

  async run(): Promise<RunEnd> {
    await this.#count()
    for (;;) {
      const end = (await this.#records()) ?? (await this.#photo())
      if (end === 'sent') continue
      if (end !== null) return end
      if (this.#need !== null) return { kind: 'need', need: this.#need }
      return this.#waits ? { kind: 'wait', afterMs: null } : { kind: 'done' }
    }
  }

  async #count(): Promise<void> {
    const { db, openPhoto } = this.#store
    const ops = await this.#toSend()
    const photos = openPhoto === null ? 0 : await db.photo.where('state').equals('waiting').count()
    this.#progress = { done: 0, total: ops.length + photos }
  }

  async #toSend(): Promise<OutboxRecord[]> {
    const { outbox } = this.#store.db
    const found = await outbox.where('state').anyOf('waiting', 'blocked').sortBy('dseq')
    return found.filter((record) => !this.#heldOps.has(record.dseq))
  }

  /** Sends and pulls until both ends are even; null when they are. */
  async #records(): Promise<RunEnd | null> {
    for (;;) {
      const records = await this.#toSend()
      if (records.length === 0 && this.#upToDate) return null
      const end = await this.#exchange(records)
      if (end !== null) return end
    }
  }

  async #exchange(records: OutboxRecord[]): Promise<RunEnd | null> {
    const { db, sender, step, outboxKey } = this.#store
    const front = records.slice(0, Math.min(this.#size.limit, FULL))
    const ops: Op[] = await Promise.all(front.map((record) => openOp(outboxKey, record)))
    const cursor = (await readMeta(db, 'cursor')) ?? null
    const sentMs = this.#ports.clock.now()
    const packed = await packRequest({
      ops,
      limit: this.#size.limit,
      cursor: this.#store.pull ? cursor : null,
      pull: this.#store.pull,
      clientTime: new Date(sentMs).toISOString(),
    })
    const signed = await signedHeaders(sender, packed.dseq, packed.body)
    step('beforeSend')
    const answer = await this.#ports.network.send({
      method: 'POST',
      path: '/api/sync',
      headers: { ...signed, 'content-type': 'application/json', 'content-encoding': 'gzip' },
      body: packed.body,
    })
    step('afterSend')
    const reply = readReply(answer, this.#ports.clock.now())
    const batch = front.slice(0, packed.count)
    if (reply.kind === 'unreachable') this.#halveAfter(this.#ports.clock.now() - sentMs)
    if (reply.kind !== 'ours') return this.#notTaken(reply, batch)
    const response = syncResponse.safeParse(reply.json)
    if (!response.success) return this.#notTaken({ kind: 'unreachable' }, batch)
    await this.#taken({ batch, cursor, response: response.data, sentMs })
    return this.#resets > MOST_RESETS ? { kind: 'wait', afterMs: null } : null
  }

  async #taken(of: {
    batch: OutboxRecord[]
    cursor: Answered['cursor']
    response: SyncResponse
    sentMs: number
  }): Promise<void> {
    const { db, apply } = this.#store
    const { response } = of
    this.#size.limit = Math.min(FULL, this.#size.limit * 2)
    const receivedMs = this.#ports.clock.now()
    const held = await readMeta(db, 'clockOffset')
    const serverMs = Date.parse(response.serverTime)
    const offsetMs = Number.isFinite(serverMs)
      ? measureOffset({ held, sentMs: of.sentMs, receivedMs, serverMs })
      : (held ?? 0)
    const applied = await apply({
      dseqs: of.batch.map((record) => record.dseq),
      cursor: of.cursor,
      response,
      offsetMs,
      nowMs: receivedMs + offsetMs,
    })
    this.bookChanged ||= applied.bookChanged
    if (applied.wasReset) this.#resets += 1
    if (response.pull.kind === 'signIn') this.#need = 'signIn'
    this.#upToDate = !applied.more
    await this.#holdWhatStays(of.batch)
  }

  /** Ops that are still to send after the answer wait for the next run. */
  async #holdWhatStays(batch: OutboxRecord[]): Promise<void> {
    const now = await this.#store.db.outbox.bulkGet(batch.map((record) => record.dseq))
    for (const record of now) {
      if (record?.state === 'waiting') this.#waits = true
      if (record?.state === 'waiting' || record?.state === 'blocked') {
        this.#heldOps.add(record.dseq)
      }
    }
    this.#advance(batch.length)
  }

  #advance(by: number): void {
    const done = this.#progress.done + by
    this.#progress = { done, total: Math.max(done, this.#progress.total) }
    this.#tell(this.#progress)
  }

  /** A request that was under way when it was cut goes in smaller parts; one that never left does not. */
  #halveAfter(tookMs: number): void {
    if (tookMs < UNDER_WAY_MS || this.#size.limit <= LEAST) return
    this.#size.limit = Math.max(LEAST, this.#size.limit >> 1)
  }

  #notTaken(
    reply: Exclude<Reply, { kind: 'ours' }>,
    batch: OutboxRecord[],
  ): Promise<RunEnd | null> | RunEnd {
    if (reply.kind === 'smaller') return this.#smaller(batch, 'too_big')
    if (reply.kind === 'never') return this.#smaller(batch, 'invalid')
    return this.#endOf(reply)
  }

  #endOf(reply: Exclude<Reply, { kind: 'ours' | 'smaller' | 'never' }>): RunEnd {
    switch (reply.kind) {
      case 'unreachable':
        return { kind: 'unreachable' }
      case 'later':
        return { kind: 'wait', afterMs: reply.afterMs }
      case 'enrol':
        return { kind: 'enrol' }
      default:
        return { kind: 'need', need: reply.kind }
    }
  }

  /** Halves what is sent until the one op is found that the shop will not have; that one is set aside. */
  async #smaller(batch: OutboxRecord[], reason: string): Promise<RunEnd | null> {
    const [only] = batch
    if (batch.length > 1) {
      this.#size.limit = Math.max(1, batch.length >> 1)
      return null
    }
    if (only === undefined) return this.#dropCursor()
    await setAside(this.#store, { dseqs: [only.dseq], reason, detail: null })
    this.#size.limit = FULL
    this.#advance(1)
    return null
  }

  /** The shop refuses even an empty request: the cursor is to blame, once. */
  async #dropCursor(): Promise<RunEnd | null> {
    const held = await readMeta(this.#store.db, 'cursor')
    if (held === undefined) return { kind: 'wait', afterMs: null }
    await this.#store.db.meta.delete('cursor')
    await writeMeta(this.#store.db, 'gen', ((await readMeta(this.#store.db, 'gen')) ?? 0) + 1)
    return null
  }

  async #photo(): Promise<RunEnd | 'sent' | null> {
    const { db, openPhoto, sender } = this.#store
    const photo = openPhoto === null ? undefined : await nextPhoto(db, this.#heldPhotos)
    if (photo === undefined || openPhoto === null) return null
    const reply = await sendPhoto(this.#ports, sender, photo, await openPhoto(photo))
    this.#heldPhotos.add(photo.hash)
    if (reply.kind === 'ours') {
      await markPhoto(db, photo.hash, { state: 'sent', reason: null })
    } else if (reply.kind === 'never' || reply.kind === 'smaller') {
      const reason = reply.kind === 'never' ? reply.code : 'too_big'
      await markPhoto(db, photo.hash, { state: 'stuck', reason })
    } else if (reply.kind === 'later') {
      // One photo that has to wait does not hold up the others.
      this.#waits = true
    } else return this.#endOf(reply)
    this.#advance(1)
    return 'sent'
  }
}
