// Runs several actors one statement at a time, in an order that the seed decides. An actor is whatever
// talks to the shop: a phone's tab with the requests it makes, a writer at the desk. In a race exactly
// one of them moves between two gates, so that the same draws give the same history, races included.
import type { Draw } from './draw'

export type Actor = {
  name: string
  state: 'moving' | 'parked' | 'blocked' | 'waiting' | 'done'
  /** The gate it stands at. */
  at: string
  /** Backend it waits for an answer of. */
  pid: number | null
  go: (() => void)[]
  /** Called at every change of state. */
  told: () => void
}

export type Work = { name: string; run(actor: Actor): Promise<void> }

/** How often a restless race changes over to another actor that could move (a choice). */
const SWITCH = 0.3
/** How many races are restless; in the others an actor goes on until it is told to stand back. */
const RESTLESS = 0.25
/** Where standing back changes something, and how often it is done there (choices). */
const STAND_BACK: readonly (readonly [RegExp, number])[] = [
  [/^(commit of changes|between)/, 0.5],
  [/^(lock_counter|take_changes|shop_counter|change_log)/, 0.3],
  [/^(send|answer|start)/, 0.15],
  [/./, 0.01],
]
const standsBack = (at: string) => STAND_BACK.find(([gate]) => gate.test(at))?.[1] ?? 0

/** Before asking the database whether an actor waits for a lock, ms. */
const PATIENCE_MS = 3
/** Waits in a row in which nobody says anything, before the race counts as stuck: a minute and more. */
const MOST_WAITS = 20_000

export class Stage {
  readonly #isBlocked: (pid: number) => Promise<boolean>
  #racing: Actor[] | null = null
  /** Gates passed in the present race. */
  trail: string[] = []

  constructor(isBlocked: (pid: number) => Promise<boolean>) {
    this.#isBlocked = isBlocked
  }

  /** Where an actor of a race stands until it is its turn; anybody else walks through. */
  async gate(actor: Actor | undefined, at: string): Promise<void> {
    if (actor === undefined || this.#racing?.includes(actor) !== true) return
    await new Promise<void>((go) => {
      actor.go.push(go)
      actor.at = at
      tell(actor, 'parked')
    })
  }

  /** Waits for something another actor does; the turn goes on without this one meanwhile. */
  async wait(actor: Actor | undefined, until: Promise<unknown>): Promise<void> {
    if (actor === undefined || this.#racing?.includes(actor) !== true) {
      await until.catch(() => undefined)
      return
    }
    tell(actor, 'waiting')
    await until.catch(() => undefined)
    await this.gate(actor, 'had its turn')
  }

  /** Lets them all run to their ends, one at a time between gates. */
  async race(draw: Draw, works: readonly Work[]): Promise<void> {
    this.trail = []
    const actors = works.map((work) => newActor(work.name))
    this.#racing = actors
    const runs = actors.map((actor, index) => this.#start(actor, works[index]))
    try {
      await this.#turns(draw, actors)
    } finally {
      this.#racing = null
      for (const actor of actors) release(actor)
    }
    await Promise.all(runs)
  }

  async #start(actor: Actor, work: Work | undefined): Promise<void> {
    await this.gate(actor, 'start')
    try {
      await work?.run(actor)
    } finally {
      tell(actor, 'done')
    }
  }

  async #turns(draw: Draw, actors: readonly Actor[]): Promise<void> {
    const choose = draw.chance(RESTLESS) ? restless(draw) : steady(draw)
    while (actors.some((actor) => actor.state !== 'done')) {
      await this.#settled(actors)
      const ready = actors.filter((actor) => actor.state === 'parked')
      const next = choose(ready)
      if (next === undefined) continue
      this.trail.push(`${next.name}: ${next.at}`)
      next.state = 'moving'
      release(next)
    }
  }

  /** Until nobody moves: each stands at a gate, waits for a lock or another actor, or is done. */
  async #settled(actors: readonly Actor[]): Promise<void> {
    for (let waits = 0; waits < MOST_WAITS; waits++) {
      const blocked = actors.filter((actor) => actor.state === 'blocked')
      for (const actor of blocked) await this.#look(actor)
      const moving = actors.filter((actor) => actor.state === 'moving')
      const canGoOn = actors.some((actor) => actor.state === 'parked')
      const over = actors.every((actor) => actor.state === 'done')
      if (moving.length === 0 && (canGoOn || over)) return
      const told = await change(moving.length === 0 ? actors : moving)
      if (told) waits = 0
      else for (const actor of moving) await this.#look(actor)
    }
    const stands = actors.map(({ name, state, at }) => `${name} is ${state} at ${at}`)
    throw new Error(
      `the race stands still: ${stands.join(', ')}; ${this.trail.slice(-40).join('; ')}`,
    )
  }

  /** Whether an actor that waits for an answer waits for a lock. */
  async #look(actor: Actor): Promise<void> {
    const { pid } = actor
    if (pid === null || (actor.state !== 'moving' && actor.state !== 'blocked')) return
    const isBlocked = await this.#isBlocked(pid)
    // It may have had its answer, and even reached the next gate, while we asked.
    if (actor.pid !== pid || (actor.state !== 'moving' && actor.state !== 'blocked')) return
    actor.state = isBlocked ? 'blocked' : 'moving'
  }
}

type Choose = (ready: readonly Actor[]) => Actor | undefined

/** Changes over now and then, anywhere. */
function restless(draw: Draw): Choose {
  let last: Actor | undefined
  return (ready) => {
    const stays = last !== undefined && ready.includes(last) && !draw.chance(SWITCH)
    last = stays ? last : draw.pick(ready)
    return last
  }
}

/**
 * In an order that is drawn, the first that can move moves; a few times one that stands before something
 * weighty goes behind all others, so that they run past it whole. Wrong orders of few steps are found so
 * far sooner than by changing over anywhere (probabilistic concurrency testing).
 */
function steady(draw: Draw): Choose {
  const order: Actor[] = []
  let left = draw.between(1, 3)
  return (ready) => {
    for (const actor of ready) {
      if (!order.includes(actor)) order.splice(draw.below(order.length + 1), 0, actor)
    }
    for (;;) {
      const next = order.find((actor) => ready.includes(actor))
      if (next === undefined || left === 0 || ready.length === 1) return next
      if (!draw.chance(standsBack(next.at))) return next
      left -= 1
      order.push(...order.splice(order.indexOf(next), 1))
    }
  }
}

const newActor = (name: string): Actor => ({
  name,
  state: 'moving',
  at: '',
  pid: null,
  go: [],
  told: () => undefined,
})

function tell(actor: Actor, state: Actor['state']): void {
  actor.state = state
  actor.told()
}

function release(actor: Actor): void {
  for (const go of actor.go.splice(0)) go()
}

/** Until one of them says something (true), or a short while (false). */
function change(actors: readonly Actor[]): Promise<boolean> {
  return new Promise((resolve) => {
    const timer = setTimeout(() => resolve(false), PATIENCE_MS)
    for (const actor of actors) {
      actor.told = () => {
        clearTimeout(timer)
        resolve(true)
      }
    }
  })
}
