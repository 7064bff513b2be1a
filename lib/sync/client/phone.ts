import { ENGINE_VERSION } from '@/lib/diag/version'
import type { Id } from '@/lib/model/id'
import type { LogBody } from '@/lib/model/log-entry'
import type { Actor } from '@/lib/model/person'
import type { Result } from '@/lib/model/result'
import type { Instant } from '@/lib/model/time'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import type { OpInput } from '@/lib/sync/protocol/op'
import { type Answered, applyAnswer, settleRows } from './answer'
import { type Core, OpenedCache } from './core'
import { Drafts } from './drafts'
import { deviceOf, type EnrolProblem, enrol } from './enrol'
import type { RowOf, StoredEntity } from './entities'
import { exportUnsent } from './export-file'
import { openKeys } from './keys'
import { type Indexed, PhoneDb, type PhotoRecord, readMeta, writeMeta } from './phone-db'
import { PhoneSender } from './phone-sender'
import { photoPlace, record } from './record'
import { refuseByRole } from './refuse-by-role'
import { RoomWatch } from './room'
import { Screens } from './screens'
import { openBytes } from './seal'
import { CorrectedClock } from './stamp'
import type { RunStore } from './sync-run'
import { watchUnsent } from './unsent-watch'
import type { NewPhoto, PhotoView, StoredEntry, UnsentView } from './views'
import { Cell, type Watch } from './watch'

export type PhoneOptions = {
  actor: Actor
  ports: SyncPorts
  indexed?: Indexed
  /** Called when a newer code book is published. */
  onBook?: () => void
  /** Called when something was kept that is to be sent. */
  onRecord?: () => void
  /** Checks and swaps of the code book that are safe for guides; none while there is no book. */
  guideSafe?: () => ReadonlySet<string>
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
    const keys = await openKeys(db)
    const { deviceId } = await deviceOf(db, ports)
    const step = options.step ?? (() => undefined)
    const core: Core = { db, keys, personId: actor.personId, cache: new OpenedCache(), step }
    const phone = new Phone(core, options, deviceId)
    phone.stamp.offsetMs = (await readMeta(db, 'clockOffset')) ?? 0
    if ((await readMeta(db, 'canary')) === undefined) {
      await writeMeta(db, 'canary', { id: ports.ids.next(), madeAt: ports.clock.now() })
    }
    await settleRows(core)
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
      ...(options.onBook === undefined ? {} : { onBook: options.onBook }),
    })
    const { sender, room } = this
    const online = () => options.ports.network.online()
    this.unsent = watchUnsent({
      core,
      state: sender.state,
      room: room.state,
      draftsKept,
      online,
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
   * AppError `notAllowed`, before anything is kept, for what the shop would refuse by role (R22).
   */
  async record(
    ops: readonly OpInput[],
    more: { photos?: readonly NewPhoto[]; clearDrafts?: readonly string[] } = {},
  ): Promise<void> {
    const clearDrafts = more.clearDrafts ?? []
    const { roles, personId } = this.#actor
    await refuseByRole(this.core, ops, { roles, personId, guideSafe: this.#guideSafe() })
    await this.drafts.settled(clearDrafts)
    await record(this.core, {
      ops,
      ids: ops.map(() => this.#ports.ids.next()),
      deviceId: this.#deviceId,
      nowMs: this.stamp.now(),
      photos: more.photos ?? [],
      clearDrafts,
    })
    await this.drafts.finished(clearDrafts)
    this.room.askToKeep().catch(() => undefined)
    this.#onRecord()
    this.sender.poke('record')
  }

  /** All unsent work as one file (P23). */
  exportFile(): Promise<Blob> {
    return exportUnsent(this.core, {
      shopId: this.actor.shopId,
      personId: this.actor.personId,
      deviceId: this.#deviceId,
      at: this.stamp.instant(),
    })
  }

  /** Stops sending and lets go of the store; everything stays on the phone. */
  close(): void {
    this.sender.stop()
    this.core.db.close()
  }

  async #runStore(): Promise<RunStore> {
    await settleRows(this.core)
    const { db, keys, step } = this.core
    const device = await deviceOf(db, this.#ports)
    return {
      db,
      outboxKey: keys.outbox,
      sender: {
        shopId: this.actor.shopId,
        personId: this.actor.personId,
        deviceId: device.deviceId,
        pair: keys.device,
      },
      pull: true,
      apply: (answered) => this.#apply(answered),
      openPhoto: (photo: PhotoRecord) => openBytes(keys.store, photoPlace(photo.hash), photo.bytes),
      step,
    }
  }

  #apply(answered: Answered) {
    this.stamp.offsetMs = answered.offsetMs
    return applyAnswer(this.core, answered)
  }
}
