// A phone in real Chromium with a profile on disk: it is held at a step of its store, killed there with
// SIGKILL, and started cold on the same profile.
import type { Actor } from '@/lib/model/person'
import { makePhone, type Phone } from '../support/e2e/phone'
import type { Kept, KillPage } from './page/kill-page'
import type { ShopLine } from './shop-line'
import { broken } from './tally'
import { mendTornLog } from './torn-log'

const SMALL = { width: 390, height: 844 }

/** Where to kill: at that step since the scenario began, so many ms after the page stood still there. */
export type Moment = { at: number; afterMs: number }

export class Handset {
  deviceId = ''
  /** The step at which it was killed last; null when it outlived what it did. */
  killedAt: string | null = null
  /** How often the browser left half a record that would have cost it the store. */
  torn = 0
  readonly #line: ShopLine
  readonly #actor: Actor
  readonly #cookie: string
  readonly #phone: Phone
  readonly #profile: string
  #dying: Promise<void> | null = null

  constructor(of: { line: ShopLine; actor: Actor; cookie: string; profile: string }) {
    this.#line = of.line
    this.#actor = of.actor
    this.#cookie = of.cookie
    this.#profile = of.profile
    this.#phone = makePhone(of.profile, of.line.base, SMALL)
  }

  /** Starts the browser cold and opens the store. */
  async start(): Promise<void> {
    const page = await this.#phone.open('/kill/')
    const [name = '', value = ''] = this.#cookie.split(/=(.*)/s)
    await this.#phone.context().addCookies([{ name, value, url: this.#line.base }])
    const deviceId = await page.evaluate((actor) => killPage!.open(actor), this.#actor)
    if (this.deviceId !== '' && this.deviceId !== deviceId) broken('P1', 'the whole store is gone')
    this.deviceId = deviceId
  }

  /** Runs the work, killed at the moment; answers the steps it went through when it outlived it. */
  async run(moment: Moment, work: () => Promise<void>): Promise<string[]> {
    this.killedAt = null
    this.#dying = null
    this.#line.onHere = (step) => this.#here(step, moment.afterMs)
    await this.ask((page, at) => page.arm(at), moment.at)
    try {
      await work()
      return await this.ask((page) => page.steps(), null)
    } catch (error) {
      if (this.killedAt === null) throw error
      return []
    } finally {
      await this.#dying
      if (this.killedAt !== null && mendTornLog(this.#profile)) this.torn += 1
    }
  }

  async #here(step: string, afterMs: number): Promise<void> {
    this.killedAt = step
    const wait = new Promise((done) => setTimeout(done, afterMs))
    this.#dying = wait.then(() => this.#phone.kill())
    // Held exactly here, or let go on towards its end.
    if (afterMs === 0) await this.#dying
  }

  /** Has the page do something. */
  ask<T, A>(what: (page: KillPage, with_: A) => T | Promise<T>, with_: A): Promise<T> {
    const text = `(${what.toString()})(globalThis.killPage, ${JSON.stringify(with_)})`
    return this.#phone.page().evaluate<T>(text)
  }

  look(draftKeys: readonly string[]): Promise<Kept> {
    return this.ask((page, keys) => page.look(keys), draftKeys)
  }

  kill(): Promise<void> {
    return this.#phone.kill()
  }
}
