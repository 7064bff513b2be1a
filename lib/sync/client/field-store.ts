import { guideSafeOf } from '@/lib/diag/guide-safe'
import type { Actor } from '@/lib/model/person'
import { AppError, fail } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { AppWorker } from './app-worker'
import { Books } from './books'
import { listenToBrowser } from './browser-events'
import {
  currentPerson,
  DeviceDb,
  leavingPerson,
  setCurrent,
  setNobody,
  wasEmptied,
} from './device-db'
import { askWho, type EnrolProblem } from './enrol'
import { ifThereIsRoom } from './free-room'
import { countToLose } from './keepsake'
import { Phone } from './phone'
import { type Indexed, readMeta } from './phone-db'
import type { Cause } from './phone-sender'
import { endSession } from './sign-out'
import type { BookView, Session } from './views'
import { Cell, type Watch } from './watch'
import { beginWipe, resumeWipes, type WipeTools } from './wipe'

/** How long an app that could open from what it holds waits for the shop's word on who is at work. */
const PATIENCE_MS = 400
/** The field app's store: who is at work, their open phone store, the code book, the service worker. */
export class FieldStore {
  readonly ports: SyncPorts
  readonly session = new Cell<Session>({ kind: 'opening' })
  readonly phone = new Cell<Phone | null>(null)
  readonly worker = new AppWorker()
  /** `blocked`: another window keeps the store from opening. `lost`: load the page again (P25). */
  readonly trouble = new Cell<'none' | 'blocked' | 'lost'>('none')
  readonly book: Watch<BookView>
  readonly #indexed: Indexed
  readonly #device: DeviceDb
  readonly #books: Books
  readonly #wiping: WipeTools
  #opening: Promise<void> | null = null

  /** `step` is called with the name of each step of emptying a store; tests let it throw. */
  constructor(ports: SyncPorts, indexed: Indexed = {}, step: (name: string) => void = none) {
    this.ports = ports
    this.#indexed = indexed
    this.#device = new DeviceDb(indexed)
    this.#wiping = { device: this.#device, ports, indexed, step }
    const { phone, worker } = this
    this.#books = new Books({ ports, indexed, worker, phone, failed: report })
    this.book = this.#books.view
  }

  /** Opens what the phone holds and listens to the browser; answers the way to stop listening. */
  start(): () => void {
    const ends = [this.book.subscribe(() => undefined), this.#listen()]
    this.#open('open')
    this.worker.register().then(
      () => this.#books.ask(true),
      () => this.#books.ask(true),
    )
    return () => {
      for (const end of ends) end()
    }
  }

  /** Resolves when the app has found out who is at work. */
  async opened(): Promise<void> {
    await this.#opening
  }

  /** Before signing out: calls the shop once more, then says how much is still unsent (SO1). */
  async tryToSend(): Promise<number> {
    const phone = this.phone.get()
    if (phone === null) return 0
    await phone.sender.sendNow('tap')
    return this.phone.get() === phone ? await countToLose(phone.core.db) : 0
  }

  /** Ends the session; the person's store stays on this phone, locked, with everything unsent. */
  async signOut(): Promise<void> {
    await this.tryToSend()
    const phone = this.phone.get()
    if (phone === null) return
    await this.#leave(phone)
  }

  /**
   * Ends the session and deletes the person's store with so much unsent work, which they have named (SO3).
   * False, and nothing done, when it is another count by now.
   */
  async signOutAndDelete(unsent: number): Promise<boolean> {
    const phone = this.phone.get()
    if (phone === null) return false
    const { core, actor } = phone
    if (!(await beginWipe(this.#wiping, { core, actor, why: 'deleted', unsent }))) return false
    await this.#leave(phone)
    await resumeWipes(this.#wiping)
    return true
  }

  async #leave(phone: Phone): Promise<void> {
    await setNobody(this.#device, phone.actor.personId)
    this.session.set({ kind: 'signedOut' })
    this.phone.set(null)
    phone.close()
    if (await endSession(this.ports)) await setNobody(this.#device, null)
  }

  /** The shop has taken this phone out and has all that was on it (Q4). */
  async #empty(phone: Phone): Promise<boolean> {
    const of = { core: phone.core, actor: phone.actor, why: 'handedOver', unsent: 0 } as const
    if (!(await beginWipe(this.#wiping, of))) return false
    await this.#leaveEmptied(phone)
    return true
  }

  async #leaveEmptied(phone: Phone): Promise<void> {
    this.phone.set(null)
    phone.close()
    this.session.set({ kind: 'signedOut' })
    await resumeWipes(this.#wiping)
    await this.#nobody()
  }

  async #nobody(): Promise<void> {
    const emptied = await wasEmptied(this.#device)
    this.session.set({ kind: 'signedOut', ...(emptied ? { emptied } : {}) })
  }

  /** A store that another window has emptied is left; what else fails is reported. */
  #failed(phone: Phone | null, cause: unknown): void {
    if (phone !== null && cause instanceof AppError && cause.kind === 'storeWiped') {
      this.#leaveEmptied(phone).catch(report)
    } else report(cause)
  }

  #open(cause: Cause): void {
    if (this.phone.get() !== null) {
      this.phone.get()?.sender.poke(cause)
      this.#books.ask(false)
      return
    }
    this.#opening ??= this.#findWho()
      .catch((cause: unknown) => {
        report(cause)
        this.session.set({ kind: 'signedOut' })
      })
      .finally(() => {
        this.#opening = null
      })
  }

  async #findWho(): Promise<void> {
    // What was begun is gone on with before anybody opens a store that is half empty.
    await resumeWipes(this.#wiping)
    const held = await currentPerson(this.#device)
    const asked = this.ports.network.online()
      ? askWho(this.ports)
      : Promise.resolve(fail<EnrolProblem>({ kind: 'unreachable' }))
    if (held === null) {
      const who = await asked
      if (who.ok && !(await this.#isLeaving(who.value))) await this.#use(who.value)
      else await this.#nobody()
      return
    }
    const soon = await Promise.race([asked, this.#after(PATIENCE_MS)])
    if (soon === null || !soon.ok || isSame(soon.value, held)) {
      await this.#use(soon?.ok === true ? soon.value : held)
    }
    const who = await asked
    if (!who.ok) return
    if (isSame(who.value, held)) await this.#renew(who.value)
    else await this.#use(who.value)
  }

  /** True for one who signed out without signal: the session is ended now instead of taken up again. */
  async #isLeaving(who: Actor): Promise<boolean> {
    if ((await leavingPerson(this.#device)) !== who.personId) return false
    if (await endSession(this.ports)) await setNobody(this.#device, null)
    return true
  }

  async #use(actor: Actor): Promise<void> {
    const phone = await Phone.open({
      actor,
      ports: this.ports,
      indexed: this.#indexed,
      onBook: () => this.#books.ask(true),
      guideSafe: () => guideSafeIn(this.book.get()),
      failed: (cause) => this.#failed(this.phone.get(), cause),
      onWipe: (wiped) => this.#empty(wiped),
      onBlocked: () => this.trouble.set('blocked'),
      onRecord: () => {
        this.worker.askToSendLater().catch(() => undefined)
      },
    })
    this.trouble.set('none')
    const why = await readMeta(phone.core.db, 'wiping')
    if (why !== undefined) {
      // Closed for emptying, and killed before that was put down: nothing new can have come since.
      const unsent = await countToLose(phone.core.db)
      await beginWipe(this.#wiping, { core: phone.core, actor, why, unsent })
      await this.#leaveEmptied(phone)
      return
    }
    phone.core.db.life.lost.subscribe(() => this.trouble.set('lost'))
    await this.#holds(actor)
    if (!(await phone.isEnrolled())) await phone.enrol()
    this.phone.get()?.close()
    this.phone.set(phone)
    const { deviceId } = phone
    this.session.set({ kind: 'ready', actor, shopId: actor.shopId, deviceId })
    phone.sender.poke('open')
    phone.room.watch(this.ports.timer, report)
    this.#books.ask(true)
  }

  /** Takes down who is at work; without room for it a phone that knows them already opens all the same. */
  #holds(actor: Actor): Promise<void> {
    return ifThereIsRoom(() => setCurrent(this.#device, actor, this.ports.clock.now()))
  }

  /** The shop's word on the same person: name and roles may have changed. */
  async #renew(actor: Actor): Promise<void> {
    await this.#holds(actor)
    const now = this.session.get()
    const phone = this.phone.get()
    if (phone !== null) phone.actor = actor
    if (now.kind !== 'ready' || JSON.stringify(now.actor) === JSON.stringify(actor)) return
    this.session.set({ ...now, actor })
  }

  #after(delayMs: number): Promise<null> {
    return new Promise((resolve) => {
      this.ports.timer.after(delayMs, () => resolve(null))
    })
  }

  /** Has the code books looked after now: a job holds one that this phone has not. */
  readonly askForBook = (): void => this.#books.ask(true)

  #listen(): () => void {
    return listenToBrowser({
      online: () => this.#open('online'),
      visible: () => {
        this.#open('visible')
        this.worker.askForUpdate(this.ports.clock.now()).catch(() => undefined)
      },
      asleep: () => this.phone.get()?.sender.yieldTurn(),
    })
  }
}

/** Safe in any version held, as the shop takes it: jobs are worked out with different ones. */
const guideSafeIn = ({ versions, of }: BookView): ReadonlySet<string> =>
  new Set(versions.flatMap((version) => [...guideSafeOf(of(version))]))

const none = (): void => undefined

const isSame = (a: Actor, b: Actor) => a.shopId === b.shopId && a.personId === b.personId

/** Hands a failure to the browser's own error reporting. */
const report = (cause: unknown): void => {
  globalThis.reportError?.(cause)
}
