// The phone dies between any two waits of a save, of a pull and of a photo's way, and starts cold.
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import type { Actor } from '@/lib/model/person'
import { logAdd, note } from '../support/field-ops'
import { RawDevice } from '../support/raw-device'
import { openSyncWorld, phoneOf, type SyncWorld, signIn, sync } from '../support/sync-world'
import { noisyPicture } from '../support/upload-world'
import { Draw } from '../sync/simulator/draw'
import { Handset, type Moment } from './handset'
import { holdArrived, holdStore, holdWhole } from './phone-proof'
import { openShopLine } from './shop-line'
import { holdChains, holdDense, looking } from './shop-proof'
import { broken, type Loop, Tally } from './tally'
import { draftOf, makeTrip, type Save, type Trip } from './trip'

const NEVER: Moment = { at: 0, afterMs: 0 }
const KEEP = 'stays'

/**
 * `every`: once at each moment a round passes through, and then `rounds` times a few ms after one; else
 * `rounds` times at one of the steps that stand for the others.
 */
export async function phoneRounds(of: Loop & { every: boolean }): Promise<Tally> {
  const tally = new Tally()
  const world = await openSyncWorld()
  const line = await openShopLine()
  const profile = mkdtempSync(join(tmpdir(), 'farbench-kill-phone-'))
  const { cookie } = await signIn(world.a, 'mechanic')
  const { id: personId = '', roles = [], name = '' } = world.a.people.mechanic ?? {}
  const actor: Actor = { shopId: world.a.id, personId, roles, name }
  const handset = new Handset({ line, actor, cookie, profile })
  try {
    const loop = new PhoneLoop(world, handset, {
      actor,
      tally,
      picture: await noisyPicture(120),
      other: (await phoneOf(world.a, 'second')).device,
    })
    await handset.start()
    // The first round has nothing to pull yet; the second shows what every one passes through.
    await loop.round(NEVER)
    const steps = await loop.round(NEVER)
    tally.add('moments', steps.length)
    for (const moment of momentsOf(steps, of)) {
      const words = `${moment.afterMs} ms after step ${moment.at} of ${steps.length}`
      await loop.round(moment).catch((cause: unknown) => {
        throw new Error(`killed ${words}: ${handset.killedAt}`, { cause })
      })
      of.say(`killed ${words}: ${handset.killedAt}`)
    }
    tally.add('records torn by the browser', handset.torn)
    await loop.end()
  } finally {
    await handset.kill()
    await line.close()
    await world.close()
    rmSync(profile, { recursive: true, force: true, maxRetries: 5 })
  }
  return tally
}

/** Steps that stand for the stages of a save, a pull and a photo's way. */
const TELLING = [
  'outbox',
  'rows',
  'written',
  'photoMarked',
  'photoBytes',
  'committed',
  'meta',
  'afterSend',
  'draftSealed',
  'stamped',
]

function momentsOf(steps: readonly string[], of: Loop & { every: boolean }): Moment[] {
  const draw = new Draw(of.seed, 1)
  if (of.every) {
    const exact = steps.map((_, n) => ({ at: n + 1, afterMs: 0 }))
    const soon = Array.from({ length: of.rounds }, () => ({
      at: draw.between(1, steps.length),
      afterMs: draw.between(1, 12),
    }))
    return [...exact, ...soon]
  }
  return Array.from({ length: of.rounds }, (_, n) => {
    const name = TELLING[n % TELLING.length]
    const places = steps.flatMap((step, place) => (step === name ? [place + 1] : []))
    if (places.length === 0) broken('P1', `no round passes through the step ${name}`)
    return { at: draw.oneOf(places), afterMs: 0 }
  })
}

type Outfit = { actor: Actor; tally: Tally; picture: Buffer; other: RawDevice }

class PhoneLoop {
  readonly #world: SyncWorld
  readonly #handset: Handset
  readonly #of: Outfit
  readonly #saves: Save[] = []
  readonly #lines: string[] = []
  readonly #jobs: string[] = []
  #n = 0
  #keeps: string | null = null

  constructor(world: SyncWorld, handset: Handset, of: Outfit) {
    this.#world = world
    this.#handset = handset
    this.#of = of
  }

  /** One round with its proof; answers the steps of one that was not killed. */
  async round(moment: Moment): Promise<string[]> {
    const { tally, picture } = this.#of
    this.#n += 1
    const device = new RawDevice(this.#of.actor)
    device.id = this.#handset.deviceId
    const trip = makeTrip(device, this.#n, picture)
    await this.#othersWrite()
    const steps = await this.#handset.run(moment, () => this.#live(trip))
    const { killedAt } = this.#handset
    if (moment.at > 0) {
      tally.add('rounds')
      tally.add(killedAt === null ? 'outlived' : 'kills')
      if (killedAt === null) await this.#handset.kill()
      await this.#handset.start()
    }
    await this.#prove(trip)
    return steps
  }

  /** Somebody else writes to the last job, so that there is something to pull. */
  async #othersWrite(): Promise<void> {
    const jobId = this.#jobs.at(-1)
    if (jobId === undefined) return
    const { other } = this.#of
    const ops = [1, 2, 3].map((n) => other.op(logAdd(other, jobId, note(`Seen from here, ${n}`))))
    await sync(other, ops)
  }

  async #live(trip: Trip): Promise<void> {
    const handset = this.#handset
    const half = `half a sentence ${trip.n}`
    for (const save of trip.saves) await this.#draft(save.draft, draftOf(save))
    trip.drafted = true
    await this.#draft(KEEP, half)
    this.#keeps = half
    for (const save of trip.saves) {
      const { ops, photo, draft } = save
      const given = { ops, photo, clearDrafts: [draft] }
      await handset.ask((page, { ops, ...more }) => page.record(ops, more), given)
      save.told = true
    }
    await handset.ask((page) => page.send(), null)
  }

  #draft(key: string, value: string): Promise<void> {
    return this.#handset.ask((page, with_) => page.draft(with_.key, with_.value), { key, value })
  }

  async #prove(trip: Trip): Promise<void> {
    const shopId = this.#world.a.id
    const { adminUrl } = this.#world.db
    const keys = [KEEP, ...trip.saves.map((save) => save.draft)]
    const cold = await this.#handset.look(keys)
    const isKept = holdWhole(cold, trip)
    this.#holdKeep(cold.drafts[KEEP], trip)
    this.#saves.push(...trip.saves.filter((_, n) => isKept[n]))
    if (isKept[0]) this.#jobs.push(trip.jobId)
    if (isKept[1]) this.#lines.push(trip.lineId)
    await looking(adminUrl, (ask) => holdStore(ask, shopId, cold))
    await this.#sendAll()
    const warm = await this.#handset.look(keys)
    holdWhole(warm, trip)
    await looking(adminUrl, async (ask) => {
      await holdStore(ask, shopId, warm)
      const { deviceId } = this.#handset
      await holdArrived(ask, shopId, {
        deviceId,
        kept: warm,
        saves: this.#saves,
        lines: this.#lines,
      })
      if ((await holdDense(ask, shopId)) !== warm.cursor)
        broken('P7', 'the phone is not up to date')
    })
    if (isKept[0]) await holdChains(shopId, [trip.jobId])
    const { tally } = this.#of
    tally.add('saves kept', isKept.filter(Boolean).length)
    tally.add('saves not there', isKept.filter((one) => !one).length)
  }

  /** The draft that nothing ends: as it was told kept last, or as it was being written. */
  #holdKeep(value: unknown, trip: Trip): void {
    const next = `half a sentence ${trip.n}`
    if (value !== this.#keeps && value !== next)
      broken('R8', `the draft is ${JSON.stringify(value)}`)
    this.#keeps = value as string | null
  }

  /** Sends until nothing is left, with rests that double as the sender's own do (P16), within a minute. */
  async #sendAll(): Promise<void> {
    const said: string[] = []
    for (let restMs = 125; restMs < 64_000; restMs *= 2) {
      const left = await this.#handset.ask((page) => page.send(), null)
      if (left.ops + left.photos === 0) return
      said.push(JSON.stringify(left))
      await sleep(restMs)
    }
    broken('P16', `a minute of the sender left something unsent: ${said.join(', ')}`)
  }

  async end(): Promise<void> {
    await holdChains(this.#world.a.id, this.#jobs)
    const ops = this.#saves.reduce((sum, save) => sum + save.ops.length, 0)
    this.#of.tally.add('ops', ops)
  }
}
