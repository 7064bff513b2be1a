import { guideSafeOf } from '@/lib/diag/book-index'
import type { Id } from '@/lib/model/id'
import type { Actor } from '@/lib/model/person'
import { fail } from '@/lib/model/result'
import type { SyncPorts } from '@/lib/ports/sync-ports'
import { AppWorker } from './app-worker'
import { BookDb, fetchBook, watchBook } from './book-store'
import { currentPerson, DeviceDb, leavingPerson, setCurrent, setNobody } from './device-db'
import { askWho, type EnrolProblem } from './enrol'
import { Phone } from './phone'
import type { Indexed } from './phone-db'
import type { Cause } from './phone-sender'
import { endSession } from './sign-out'
import type { BookView, Session } from './views'
import { Cell, LiveCell } from './watch'

/** How long an app that could open from what it holds waits for the shop's word on who is at work. */
const PATIENCE_MS = 400
/** A code book that is held is asked after no more often than this (a choice). */
const BOOK_EVERY_MS = 10 * 60 * 1000

const NO_BOOK_YET: BookView = { status: 'opening', index: null, version: null }

/** The field app's store: who is at work, their open phone store, the code book, the service worker. */
export class FieldStore {
  readonly ports: SyncPorts
  readonly session = new Cell<Session>({ kind: 'opening' })
  readonly phone = new Cell<Phone | null>(null)
  readonly worker = new AppWorker()
  readonly book: LiveCell<BookView>
  readonly #indexed: Indexed
  readonly #device: DeviceDb
  readonly #books: BookDb
  #opening: Promise<void> | null = null
  #bookAskedMs = Number.NEGATIVE_INFINITY

  constructor(ports: SyncPorts, indexed: Indexed = {}) {
    this.ports = ports
    this.#indexed = indexed
    this.#device = new DeviceDb(indexed)
    this.#books = new BookDb(indexed)
    this.book = new LiveCell(NO_BOOK_YET, (emit) => this.#followBook(emit))
  }

  /** Opens what the phone holds and listens to the browser; answers the way to stop listening. */
  start(): () => void {
    const ends = [this.book.subscribe(() => undefined), this.#listen()]
    this.#open('open')
    this.worker.register().then(
      () => this.#askForBook(true),
      () => this.#askForBook(true),
    )
    return () => {
      for (const end of ends) end()
    }
  }

  /** Resolves when the app has found out who is at work. */
  async opened(): Promise<void> {
    await this.#opening
  }

  /** Ends the session; the person's store stays on this phone, with everything unsent. */
  async signOut(): Promise<void> {
    const phone = this.phone.get()
    if (phone === null) return
    await phone.sender.sendNow('tap')
    await setNobody(this.#device, phone.actor.personId)
    this.session.set({ kind: 'signedOut' })
    this.phone.set(null)
    phone.close()
    if (await endSession(this.ports)) await setNobody(this.#device, null)
  }

  #open(cause: Cause): void {
    if (this.phone.get() !== null) {
      this.phone.get()?.sender.poke(cause)
      this.#askForBook(false)
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
    const held = await currentPerson(this.#device)
    const asked = this.ports.network.online()
      ? askWho(this.ports)
      : Promise.resolve(fail<EnrolProblem>({ kind: 'unreachable' }))
    if (held === null) {
      const who = await asked
      if (who.ok && !(await this.#isLeaving(who.value))) await this.#use(who.value)
      else this.session.set({ kind: 'signedOut' })
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
      onBook: () => this.#askForBook(true),
      guideSafe: () => guideSafeOf(this.book.get().index),
      failed: report,
      onRecord: () => {
        this.worker.askToSendLater().catch(() => undefined)
      },
    })
    await setCurrent(this.#device, actor, this.ports.clock.now())
    if (!(await phone.isEnrolled())) await phone.enrol()
    this.phone.get()?.close()
    this.phone.set(phone)
    const { deviceId } = phone
    this.session.set({ kind: 'ready', actor, shopId: actor.shopId, deviceId })
    phone.sender.poke('open')
    phone.room.look().catch(() => undefined)
    this.#askForBook(true)
  }

  /** The shop's word on the same person: name and roles may have changed. */
  async #renew(actor: Actor): Promise<void> {
    await setCurrent(this.#device, actor, this.ports.clock.now())
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

  #followBook(emit: (view: BookView) => void): () => void {
    let leave: () => void = () => undefined
    const follow = () => {
      leave()
      leave = () => undefined
      const phone = this.phone.get()
      if (phone === null) return
      const book = watchBook(this.#books, phone.actor.shopId, report)
      leave = book.subscribe(() => emit(book.get()))
    }
    const end = this.phone.subscribe(follow)
    follow()
    return () => {
      end()
      leave()
    }
  }

  /** Has the code book looked after, by the worker where there is one. */
  #askForBook(now: boolean): void {
    const shopId: Id | undefined = this.phone.get()?.actor.shopId
    const isHeld = this.book.get().status === 'ready'
    const sinceMs = this.ports.clock.now() - this.#bookAskedMs
    if (shopId === undefined || (!now && isHeld && sinceMs < BOOK_EVERY_MS)) return
    this.#bookAskedMs = this.ports.clock.now()
    if (!this.worker.loadBook(shopId)) {
      fetchBook(this.#books, this.ports.network, shopId).catch(() => undefined)
    }
  }

  #listen(): () => void {
    if (typeof document === 'undefined') return () => undefined
    const online = () => this.#open('online')
    const visible = () => {
      if (document.visibilityState !== 'visible') return
      this.#open('visible')
      this.worker.askForUpdate(this.ports.clock.now()).catch(() => undefined)
    }
    globalThis.addEventListener('online', online)
    globalThis.addEventListener('pageshow', visible)
    document.addEventListener('visibilitychange', visible)
    return () => {
      globalThis.removeEventListener('online', online)
      globalThis.removeEventListener('pageshow', visible)
      document.removeEventListener('visibilitychange', visible)
    }
  }
}

const isSame = (a: Actor, b: Actor) => a.shopId === b.shopId && a.personId === b.personId

/** Hands a failure to the browser's own error reporting. */
const report = (cause: unknown): void => {
  globalThis.reportError?.(cause)
}
