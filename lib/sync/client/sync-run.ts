import type { SyncPorts } from '@/lib/ports/sync-ports'
import { unfolded } from '@/lib/sync/protocol/brief'
import { type SyncResponse, syncResponse } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import type { BatchSize } from './batch-size'
import { packRequest, type Sender, signedHeaders } from './envelope'
import { heldBeyond } from './held'
import { measureOffset } from './hlc'
import { offerAll } from './offer-all'
import { recordsIn } from './outbox'
import { type Answered, type Applied, setAside } from './outcomes'
import { type OutboxRecord, type PhoneDb, readMeta, writeMeta } from './phone-db'
import type { Pace } from './photo-pace'
import type { PhotoStore } from './photo-run'
import { PhotoTurn } from './photo-turn'
import { type Reply, readReply } from './reply'
import { endOf, type RunEnd } from './run-end'
import type { Need } from './views'

/** What a run needs of a store; the worker's has no rows and perhaps no photos. */
export type RunStore = {
  db: PhoneDb
  openOp(record: OutboxRecord): Promise<Op>
  sender: Sender
  pull: boolean
  apply(answered: Answered): Promise<Applied>
  openPhoto: PhotoStore['openPhoto']
  step(name: string): void
}

export type Progress = { done: number; total: number }

const MOST_RESETS = 2
/** While photos go, the shop is asked what is new as often as by an idle phone. */
const PULL_EVERY_MS = 60_000

/**
 * One run: records first, oldest first, with the pull in the same request (P3); then photos, one chunk at
 * a time, each time looking for new records before the next (PH3). It ends when nothing is left to do.
 */
export class SyncRun {
  bookChanged: boolean = false
  #need: Need = null
  #waits: boolean = false
  #upToDate: boolean
  #resets = 0
  /** The shop's last word: this phone was taken out, and nothing is left on it. */
  #wipe: boolean = false
  #offered: boolean = false
  /** Photos it was told of that had not gone. */
  #toldPhotos = 0
  /** Sent in this run without being taken: not sent again in it. */
  readonly #heldOps = new Set<number>()
  readonly #photos: PhotoTurn
  #pulledMs: number
  readonly #store: RunStore
  readonly #ports: SyncPorts
  readonly #size: BatchSize
  readonly #tell: (progress: Progress) => void
  #progress: Progress = { done: 0, total: 0 }

  constructor(of: {
    store: RunStore
    ports: SyncPorts
    size: BatchSize
    pace: Pace
    tell: (progress: Progress) => void
  }) {
    this.#store = of.store
    this.#ports = of.ports
    this.#size = of.size
    this.#tell = of.tell
    this.#upToDate = !of.store.pull
    this.#photos = new PhotoTurn(of.store, of.ports, of.pace)
    this.#pulledMs = of.ports.clock.now()
  }

  async run(): Promise<RunEnd> {
    await this.#count()
    for (;;) {
      const end = (await this.#records()) ?? (await this.#photo())
      if (end === 'sent') continue
      if (end !== null) return end
      if (await this.#tellsAgain()) continue
      if (this.#wipe) return { kind: 'wipe' }
      if (this.#need !== null) return { kind: 'need', need: this.#need }
      return this.#waits || this.#photos.waits ? { kind: 'wait', afterMs: null } : { kind: 'done' }
    }
  }

  /**
   * True when the shop is to hear once more: photos it was told of have gone since; or it takes this phone
   * out, and what it once refused is offered before anything is emptied (Q4).
   */
  async #tellsAgain(): Promise<boolean> {
    const { db } = this.#store
    const left = await db.photo.where('state').equals('waiting').count()
    const hasNews = this.#toldPhotos > left
    const offers = this.#wipe && !this.#offered && (await offerAll(this.#store))
    this.#offered ||= this.#wipe
    if (offers) this.#photos.again()
    if (!hasNews && !offers) return false
    this.#toldPhotos = left
    this.#wipe = false
    this.#upToDate = false
    return true
  }

  async #count(): Promise<void> {
    const ops = (await this.#waiting()).length
    this.#progress = { done: 0, total: ops + (await this.#photos.count()) }
  }

  #waiting(): Promise<OutboxRecord[]> {
    return recordsIn(this.#store.db, 'waiting', 'blocked')
  }

  /** Sends and pulls until both ends are even; null when they are. */
  async #records(): Promise<RunEnd | null> {
    for (;;) {
      const waiting = await this.#waiting()
      const records = waiting.filter((record) => !this.#heldOps.has(record.dseq))
      if (records.length === 0 && this.#upToDate) return null
      const end = await this.#exchange({ records, waiting })
      if (end !== null) return end
    }
  }

  async #exchange(left: Record<'records' | 'waiting', OutboxRecord[]>): Promise<RunEnd | null> {
    const { db, sender, step, openOp } = this.#store
    const front = left.records.slice(0, this.#size.limit)
    const ops: Op[] = await Promise.all(front.map(openOp))
    const cursor = (await readMeta(db, 'cursor')) ?? null
    const held = await heldBeyond(db, left)
    const sentMs = this.#ports.clock.now()
    const packed = await packRequest({
      sender,
      ops,
      limit: this.#size.limit,
      cursor: this.#store.pull ? cursor : null,
      pull: this.#store.pull,
      clientTime: new Date(sentMs).toISOString(),
      held,
      canary: (await readMeta(db, 'canary'))?.id ?? null,
      book: await readMeta(db, 'bookVersion'),
    })
    this.#toldPhotos = held(0).photos
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
    if (reply.kind === 'unreachable') {
      this.#size.cut(batch.length, this.#ports.clock.now() - sentMs)
    }
    if (reply.kind !== 'ours') return this.#notTaken(reply, batch)
    const read = syncResponse.safeParse(reply.json)
    const response = read.success ? unfolded(read.data, ops.slice(0, packed.count)) : undefined
    if (response === undefined) return this.#notTaken({ kind: 'unreachable' }, batch)
    await this.#taken({ batch, cursor, response, sentMs })
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
    this.#size.arrived()
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
    if (applied.noRoom === true) this.#need = 'room'
    this.#wipe = response.order === 'wipe'
    if (response.pull.kind === 'signIn') this.#need = 'signIn'
    this.#upToDate = !applied.more
    this.#pulledMs = receivedMs
    await this.#holdWhatStays(of.batch)
  }

  /** Ops that are still to send after the answer wait for the next run. */
  async #holdWhatStays(batch: OutboxRecord[]): Promise<void> {
    const sent = new Set(batch.map((record) => record.dseq))
    for (const { dseq, state } of await this.#waiting()) {
      if (!sent.has(dseq)) continue
      if (state === 'waiting') this.#waits = true
      this.#heldOps.add(dseq)
    }
    this.#advance(batch.length)
  }

  #advance(by: number): void {
    const done = this.#progress.done + by
    this.#progress = { done, total: Math.max(done, this.#progress.total) }
    this.#tell(this.#progress)
  }

  #notTaken(
    reply: Exclude<Reply, { kind: 'ours' }>,
    batch: OutboxRecord[],
  ): Promise<RunEnd | null> | RunEnd {
    if (reply.kind === 'smaller') return this.#smaller(batch, 'too_big')
    if (reply.kind === 'never') return this.#smaller(batch, 'invalid')
    return endOf(reply)
  }

  /** Halves what is sent until the one op is found that the shop will not have; that one is set aside. */
  async #smaller(batch: OutboxRecord[], reason: string): Promise<RunEnd | null> {
    const [only] = batch
    if (batch.length > 1) {
      this.#size.tooMuch(batch.length)
      return null
    }
    if (only === undefined) return this.#dropCursor()
    await setAside(this.#store, { dseqs: [only.dseq], reason, detail: null })
    this.#size.reset()
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
    const went = await this.#photos.next()
    if (went === 'over') this.#advance(1)
    if (went !== 'over' && went !== 'moved') return went
    // Photos may take long: what the shop has to say is not left waiting for them.
    if (this.#store.pull && this.#ports.clock.now() - this.#pulledMs > PULL_EVERY_MS) {
      this.#upToDate = false
    }
    return 'sent'
  }
}
