// Everything of one run: the truth about the time, the two shops, the phones, what was written by whom,
// and what the seed has drawn so far.
import pg from 'pg'
import type { SyncWorld } from '../../support/sync-world'
import type { Backup } from './backup'
import type { Broken } from './broken-rule'
import { Draw } from './draw'
import { Handset, type User } from './handset'
import { Ledger } from './ledger'
import { deliver, type Sent } from './line'
import { makeSimShop, type SimPerson, type SimShop, sessionOf, type Who } from './shop-set'
import { type Actor, Stage } from './stage'
import { setHook, through } from './statements'
import { newTruth, type Truth, takeOverShopPorts } from './truth'

export class World {
  readonly base: SyncWorld
  readonly seed: number
  readonly truth: Truth
  readonly stage: Stage
  readonly ledger = new Ledger()
  readonly admin: pg.Client
  readonly late: Sent[] = []
  readonly figures = new Map<string, number>()
  readonly faults = new Map<string, number>()
  draw: Draw
  /** Share of requests that meet a fault on the line. */
  faultShare = 0
  handsets: Handset[] = []
  shops: SimShop[] = []
  /** Phones that did something in this step. */
  readonly touched = new Set<Handset>()
  backup: {
    data: Backup
    roles: (readonly [SimPerson, SimPerson['roles']])[]
    revoked: Set<string>
  } | null = null
  restores = 0
  /** Requests of this step. */
  requests = 0
  hasMerged: boolean = false
  hasPruned: boolean = false
  /** Stores whose phone or person the shop has shut out. */
  revoked = new Set<string>()
  /** Broken promises found where nothing can be thrown. */
  readonly found: Broken[] = []

  private constructor(base: SyncWorld, seed: number, salt: number, admin: pg.Client) {
    this.base = base
    this.seed = seed
    this.truth = newTruth(seed, salt)
    this.draw = new Draw(seed, -1)
    this.admin = admin
    this.stage = new Stage((pid) => this.#isBlocked(pid))
  }

  /** Makes the shops and the phones of a seed; each phone is enrolled, most have pulled. */
  static async open(base: SyncWorld, seed: number, salt = 0): Promise<World> {
    const admin = new pg.Client({ connectionString: base.db.adminUrl })
    await admin.connect()
    const world = new World(base, seed, salt, admin)
    takeOverShopPorts(world.truth)
    setHook({
      stage: world.stage,
      kill: (pid) => world.#kill(pid),
      holdCounters: () => world.#holdCounters(),
    })
    world.shops = [await makeSimShop(world.truth, 'A'), await makeSimShop(world.truth, 'B')]
    await world.#handOut()
    return world
  }

  async close(): Promise<void> {
    for (const handset of this.handsets) await handset.close()
    setHook({ stage: null })
    await this.admin.end()
  }

  count(what: string, by = 1): void {
    this.figures.set(what, (this.figures.get(what) ?? 0) + by)
  }

  fault(what: string): void {
    this.faults.set(what, (this.faults.get(what) ?? 0) + 1)
  }

  broken(rule: string, what: string, cause?: unknown): void {
    this.found.push({ rule, what, cause })
  }

  /** Lets time pass; whatever the phones had planned for it goes off. */
  async pass(ms: number): Promise<void> {
    this.truth.pass(ms)
    for (const handset of this.handsets) await handset.ring()
  }

  /** Name of the store that is in use on a phone. */
  storeKey(handset: Handset, user: User = handset.user): string {
    return `${handset.name}/${user.person.id}`
  }

  people(): SimPerson[] {
    return this.shops.flatMap((shop) => Object.values(shop.people))
  }

  /** Runs a writer of the desk; its statements stand at the gates of a race. */
  atDesk(actor: Actor | undefined, write: () => Promise<void>): Promise<void> {
    return through({ actor, fault: null, count: 0, commits: 0 }, write)
  }

  /** Signs the user in again. */
  async signIn(user: User): Promise<void> {
    user.cookie = await sessionOf(this.truth, user.shop, user.person)
  }

  /** Delivers a request that was held up, long after the phone gave it up. */
  async deliverLate(sent: Sent): Promise<void> {
    await deliver(this, null, sent, null)
  }

  async #handOut(): Promise<void> {
    const [a, b] = this.shops as [SimShop, SimShop]
    const draw = this.draw
    const user = (shop: SimShop, who: Who): User => ({
      shop,
      person: shop.people[who],
      cookie: null,
    })
    const third = draw.oneOf<Who>(['guide', 'dispatcher', 'both', 'owner'])
    const users: User[][] = [
      [user(a, 'mechanic')],
      [user(a, 'second'), user(a, 'guide')],
      [user(a, third), user(b, 'second')],
      [user(b, 'mechanic')],
      // The same person on a second phone, or somebody else.
      [draw.chance(0.5) ? user(b, 'mechanic') : user(b, draw.oneOf<Who>(['dispatcher', 'both']))],
    ]
    this.handsets = users.map((of, index) => new Handset(this, 11 + index, `p${index + 1}`, of))
    for (const handset of this.handsets) {
      for (const of of handset.users) await this.signIn(of)
      const { phone } = await handset.tab()
      await phone.enrol()
      if (draw.chance(0.8)) await phone.sender.sendNow('open')
    }
  }

  async #isBlocked(pid: number): Promise<boolean> {
    const { rows } = await this.admin.query('select cardinality(pg_blocking_pids($1)) as n', [pid])
    return rows[0]?.n > 0
  }

  async #kill(pid: number): Promise<void> {
    await this.admin.query('select pg_terminate_backend($1, 5000)', [pid])
  }

  /** Somebody else holds the counters; when an actor of the race holds one already, that is enough. */
  async #holdCounters(): Promise<() => Promise<void>> {
    const ids = this.shops.map((shop) => shop.id)
    const holder = new pg.Client({ connectionString: this.base.db.adminUrl })
    await holder.connect()
    const end = () => holder.end()
    try {
      await holder.query('begin')
      const held = 'select from shop_counter where shop_id = any($1) for update nowait'
      await holder.query(held, [ids])
      return end
    } catch {
      await end()
      return () => Promise.resolve()
    }
  }
}
