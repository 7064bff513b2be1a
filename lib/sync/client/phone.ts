import { ENGINE_VERSION } from '@/lib/diag/version'
import type { Id } from '@/lib/model/id'
import type { LogBody } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import { AppError, ok, type Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { OpInput } from '@/lib/sync/protocol/op'
import { plantCanary } from './canary'
import { type Core, OpenedCache } from './core'
import { Drafts } from './drafts'
import { deviceOf, type EnrolProblem, enrol } from './enrol'
import type { RowOf, StoredEntity } from './entities'
import type { Sender } from './envelope'
import { ifThereIsRoom } from './free-room'
import { keepAnswer } from './keep-answer'
import { remember } from './keepsake'
import { openKeys } from './keys'
import type { Answered } from './outcomes'
import { type Indexed, type Notice, PhoneDb, readMeta, writeMeta } from './phone-db'
import { PhoneSender } from './phone-sender'
import { photoPlace, type Recorded, record } from './record'
import { refuseByRole } from './refuse-by-role'
import { RoomWatch } from './room'
import { Screens } from './screens'
import { openBytes } from './seal'
import { settleRows } from './settle-rows'
import { CorrectedClock, opIdOf } from './stamp'
import type { RunStore } from './sync-run'
import { watchUnsent } from './unsent-watch'
import type { NewPhoto, PhotoView, StoredEntry, UnsentView } from './views'
import { Cell, type Watch } from './watch'
import { isWiped } from './wipe'

export type PhoneOptions = {
  actor: Actor
  ports: SyncPorts
  indexed?: Indexed
  /** Called when a newer code book is published. */
  onBook?: () => void
  /** Called when something was kept that is to be sent. */
  onRecord?: () => void
  /** Called when another window holds the store open in an older version, so that it cannot be opened yet. */
  onBlocked?: () => void
  /** Checks and swaps of the code book that are safe for guides; none while there is no book. */
  guideSafe?: () => ReadonlySet<string>
  /** Called when the shop has all that was on this phone and it is to be emptied (Q4). */
  onWipe?: (phone: Phone) => Promise<boolean>
  /** Called when the store fails under a screen or the sender. */
  failed?: (cause: unknown) => void
  /** Tests let it throw at a step. */
  step?: (name: string) => void
}

/** One person's store in one shop, open: everything the field app reads, keeps and sends. */
export class Phone {
  readonly #guideSafe: () => ReadonlySet<string>
  readonly drafts: Drafts
  readonly sender: PhoneSender
  readonly stamp: CorrectedClock
  readonly unsent: Watch<UnsentView>
  readonly room = new RoomWatch()
  readonly core: Core
  readonly #ports: SyncPorts
  readonly #screens: Screens
  readonly #onRecord: () => void
  #actor: Actor
  #deviceId: Id

  /** Opens the store, makes it on first use, and works out rows a worker has left. */
  static async open(options: PhoneOptions): Promise<Phone> {
    const { actor, ports } = options
    const db = new PhoneDb(actor.shopId, actor.personId, options.indexed)
    db.on('blocked', () => options.onBlocked?.())
    const keys = await db.life.run(() => openKeys(db))
    const { deviceId } = await deviceOf(db, ports)
    const step = options.step ?? (() => undefined)
    const core: Core = { db, keys, personId: actor.personId, cache: new OpenedCache(), step }
    const phone = new Phone(core, options, deviceId)
    phone.stamp.offsetMs = (await readMeta(db, 'clockOffset')) ?? 0
    await plantCanary(db, ports)
    await ifThereIsRoom(() => settleRows(core))
    await remember(db, ports, null)
    return phone
  }

  private constructor(core: Core, options: PhoneOptions, deviceId: Id) {
    const failed = options.failed ?? (() => undefined)
    this.core = core
    this.#actor = options.actor
    this.#guideSafe = options.guideSafe ?? (() => new Set())
    this.#ports = options.ports
    this.#deviceId = deviceId
    this.#onRecord = options.onRecord ?? (() => undefined)
    this.stamp = new CorrectedClock(options.ports)
    const draftsKept = new Cell(true)
    this.drafts = new Drafts({
      ...core,
      now: () => this.stamp.now(),
      kept: (isKept) => draftsKept.set(isKept),
    })
    this.#screens = new Screens(core, failed)
    this.sender = new PhoneSender({
      store: () => this.#runStore(),
      db: core.db,
      keys: core.keys,
      ports: options.ports,
      shopId: options.actor.shopId,
      failed,
      onWipe: async () => (await options.onWipe?.(this)) ?? false,
      onRun: () => remember(core.db, options.ports, null),
      ...(options.onBook === undefined ? {} : { onBook: options.onBook }),
    })
    const { sender, room } = this
    this.unsent = watchUnsent({
      core,
      state: sender.state,
      room: room.state,
      draftsKept,
      ports: options.ports,
      now: () => this.stamp.now(),
      failed,
    })
  }

  /** The person whose store it is, with the roles the shop last told of. */
  get actor(): Actor {
    return this.#actor
  }

  /** The shop's newest word on that person. */
  set actor(actor: Actor) {
    this.#actor = actor
  }

  /** This phone's id at the shop. */
  get deviceId(): Id {
    return this.#deviceId
  }

  /** True once the shop knows this phone's key. */
  async isEnrolled(): Promise<boolean> {
    return (await readMeta(this.core.db, 'device'))?.enrolled === true
  }

  /** Makes the shop know this phone's key; needs signal and a session (P18). */
  async enrol(): Promise<Result<Id, EnrolProblem>> {
    const enrolled = await enrol(this.core.db, this.core.keys, this.#ports)
    if (enrolled.ok) this.#deviceId = enrolled.value
    return enrolled
  }

  rows<E extends StoredEntity>(entity: E, jobId?: Id): Watch<RowOf<E>[] | undefined> {
    return this.#screens.rows(entity, jobId)
  }

  notices(jobId: Id): Watch<Notice[]> {
    return this.#screens.notices(jobId)
  }

  /** The person has seen what there was to say of a job. */
  async noticed(jobId: Id): Promise<void> {
    const { db } = this.core
    await db.transaction('rw', db.meta, async () => {
      const held = (await readMeta(db, 'notices')) ?? []
      const left = held.filter((notice) => notice.jobId !== jobId)
      await writeMeta(db, 'notices', left)
    })
  }

  log(jobId: Id): Watch<StoredEntry[] | undefined> {
    return this.#screens.log(jobId)
  }

  photo(hash: string): Watch<PhotoView> {
    return this.#screens.photo(hash)
  }

  /** One line of the job log, stamped. `happenedAt` may be typed; else it is now. */
  entry(
    jobId: Id,
    body: LogBody,
    more: { bookVersion: number | null; happenedAt?: Instant; supersedes?: Id },
  ): OpInput & { kind: 'log.add' } {
    const now = this.stamp.instant()
    return {
      kind: 'log.add',
      fields: {
        id: this.#ports.ids.next(),
        jobId,
        supersedes: more.supersedes ?? null,
        happenedAt: more.happenedAt ?? now,
        writtenAt: now,
        zone: this.#ports.zone(),
        authorId: this.actor.personId,
        deviceId: this.#deviceId,
        engineVersion: ENGINE_VERSION,
        bookVersion: more.bookVersion,
        body,
      },
    }
  }

  /**
   * Keeps ops, rows, photos and finished drafts in one transaction (P1), then calls the sender. Throws
   * AppError `notAllowed`, before anything is kept, for what the shop would refuse by role (R22),
   * `noRoomForPhoto` while records would still fit, `storeFull` when nothing does.
   */
  async record(
    ops: readonly OpInput[],
    more: { photos?: readonly NewPhoto[]; clearDrafts?: readonly string[] } = {},
  ): Promise<void> {
    const clearDrafts = more.clearDrafts ?? []
    const photoBytes = (more.photos ?? []).reduce((sum, photo) => sum + photo.bytes.byteLength, 0)
    if (photoBytes > 0 && !(await this.room.hasRoomFor(photoBytes))) {
      throw new AppError('noRoomForPhoto')
    }
    const { roles, personId } = this.#actor
    await refuseByRole(this.core, ops, { roles, personId, guideSafe: this.#guideSafe() })
    await this.drafts.settled(clearDrafts)
    await this.#keep({ ops, photos: more.photos ?? [], clearDrafts })
    await this.drafts.finished(clearDrafts)
    await remember(this.core.db, this.#ports, this.stamp.now())
    this.core.step('remembered')
    this.room.askToKeep().catch(() => undefined)
    this.#onRecord()
    this.sender.poke('record')
  }

  /** Does a refused step again from where things stand now; or says in one sentence why it cannot. */
  async redo(opId: Id): Promise<Result<null, { words: string }>> {
    const { redoOf } = await import('./redo')
    const again = await redoOf(this.core, opId)
    if (!again.ok) return again
    const { record: insteadOf, input } = again.value
    await this.#keep({ ops: [input], photos: [], clearDrafts: [], insteadOf })
    this.#onRecord()
    this.sender.poke('tap')
    return ok(null)
  }

  /** Gives up sending something that is stuck: a record by its op id, or a photo by its hash. */
  async letGo(of: { opId: Id } | { hash: string }): Promise<void> {
    const { letPhotoGo, letRecordGo } = await import('./let-go')
    if ('opId' in of) await letRecordGo(this.core, of.opId, this.stamp.now())
    else await letPhotoGo(this.core, of.hash)
  }

  /** All unsent work as signed files, mostly one (P23). */
  async exportFiles(): Promise<Blob[]> {
    const { exportUnsent } = await import('./export-file')
    return await exportUnsent(this.core, await this.#asSender(), this.stamp.instant())
  }

  #keep(of: Omit<Recorded, 'ids' | 'deviceId' | 'nowMs'>): Promise<void> {
    const ids = of.ops.map((input) => opIdOf(input) ?? this.#ports.ids.next())
    return record(this.core, {
      ...of,
      ids,
      deviceId: this.#deviceId,
      nowMs: this.stamp.now(),
    })
  }

  /** Stops sending and lets go of the store; everything stays on the phone. */
  close(): void {
    this.sender.stop()
    this.room.end()
    this.core.db.life.end()
    this.core.db.close()
  }

  async #runStore(): Promise<RunStore> {
    if (await isWiped(this.core.db)) throw new AppError('storeWiped')
    await ifThereIsRoom(() => settleRows(this.core))
    const { db, keys, step, cache } = this.core
    return {
      db,
      openOp: (record) => cache.op(keys.outbox, record),
      sender: await this.#asSender(),
      pull: true,
      apply: (answered) => this.#apply(answered),
      openPhoto: (hash, sealed) => openBytes(keys.store, photoPlace(hash), sealed),
      step,
    }
  }

  async #asSender(): Promise<Sender> {
    const { shopId, personId } = this.actor
    const { deviceId } = await deviceOf(this.core.db, this.#ports)
    return { shopId, personId, deviceId, pair: this.core.keys.device }
  }

  #apply(answered: Answered) {
    this.stamp.offsetMs = answered.offsetMs
    return keepAnswer(this.core, answered)
  }
}
