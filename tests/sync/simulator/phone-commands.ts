// What people do with a phone: write, send, and several things at once.
import { AppError } from '@/lib/model/result'
import { DESK_WRITERS } from './desk-writers'
import { type Handset, isFull, isKilled, type Tab } from './handset'
import { MAKERS, type Made, viewOf } from './op-makers'
import type { SimShop } from './shop-set'
import type { Actor, Work } from './stage'
import type { World } from './world'

/** Most steps at which the program may be killed, counted from the start of what it does. */
const KILL_WITHIN = 30

function maybeKill({ draw }: World, tab: Tab, share = 0.12): void {
  if (draw.chance(share)) tab.killIn = draw.between(1, KILL_WITHIN)
}

export async function recordOn(world: World, handset: Handset, tab?: Tab): Promise<string> {
  const at = tab ?? (await handset.tab())
  if (tab === undefined) maybeKill(world, at)
  return await writeSomething(world, handset, at)
}

const isError = (cause: unknown, kind: AppError['kind']): boolean =>
  cause instanceof AppError && cause.kind === kind

async function writeSomething(
  world: World,
  handset: Handset,
  tab: Tab,
  sent = () => tab.phone.sender.idle(),
): Promise<string> {
  const { draw, truth } = world
  const view = await viewOf(tab, draw, () => truth.id(handset.maker))
  const makers = handset.protocol === 'now' ? MAKERS : MAKERS.filter(({ since }) => since !== 2)
  let made: Made | undefined
  for (let tries = 0; made === undefined && tries < 6; tries++) {
    made = draw.weighted(makers).make(view)
  }
  if (made === undefined) return 'nothing to write about'
  const names = made.ops.map((op) => op.kind).join('+')
  world.touched.add(handset)
  const pending = world.ledger.begin(world.storeKey(handset), made)
  try {
    await tab.phone.record(made.ops, { photos: made.photos ?? [] })
  } catch (cause) {
    // The phone's own gate keeps nothing that the shop must refuse by role (R22).
    if (isError(cause, 'notAllowed')) return `${names} not allowed`
    // Taken out and closed for its emptying, which follows at the step's end (Q4).
    if (isError(cause, 'storeWiped')) return `${names} not kept, the store is closed`
    if (!isKilled(cause) && !isFull(cause)) throw cause
    world.fault(isFull(cause) ? 'noRoomToRecord' : 'killedRecording')
    return `${names} not kept`
  }
  pending.isKept = true
  world.count('ops', made.ops.length)
  await sent()
  return names
}

export async function syncOn(world: World, handset: Handset): Promise<string> {
  const tab = await handset.tab()
  maybeKill(world, tab)
  world.touched.add(handset)
  await tab.phone.sender.sendNow('tap')
  return tab.killedAt === null ? '' : `killed at ${tab.killedAt}`
}

/** Several at once, one statement at a time: phones, tabs of one phone, writers of the desk. */
export async function race(world: World, handset: Handset): Promise<string> {
  const { draw } = world
  const shop = handset.user.shop
  const others = world.handsets.filter((one) => one !== handset && one.user.shop === shop)
  const other = draw.chance(0.6) ? draw.pick(others) : undefined
  for (const one of [handset, other]) if (one && draw.chance(0.7)) await writeUnsent(world, one)
  const works: Work[] = [await syncWork(world, handset, 'first')]
  if (other) works.push(await syncWork(world, other, 'first'))
  if (draw.chance(0.3)) works.push(await syncWork(world, handset, 'second'))
  if (draw.chance(0.2)) works.push(await recordWork(world, handset))
  if (works.length < 2 || draw.chance(0.7)) works.push(deskWork(world, shop))
  await world.stage.race(draw, works)
  return works.map((work) => work.name).join(' | ')
}

/** Something to hand over when the race begins. */
async function writeUnsent(world: World, handset: Handset): Promise<void> {
  const had = handset.signal
  handset.signal = false
  await writeSomething(world, handset, await handset.tab())
  handset.signal = had
}

async function syncWork(world: World, handset: Handset, which: 'first' | 'second'): Promise<Work> {
  const first = await handset.tab()
  const tab = which === 'first' ? first : (handset.tabs[1] ?? (await handset.openTab()))
  maybeKill(world, tab, 0.05)
  world.touched.add(handset)
  const run = (actor: Actor) => inTab(world, tab, actor, () => tab.phone.sender.sendNow('tap'))
  return { name: `${handset.name} ${which} tab`, run }
}

/** Sending goes under the actor who began it; whoever joins in waits for that one. */
async function inTab(
  world: World,
  tab: Tab,
  actor: Actor,
  sending: () => Promise<void>,
): Promise<void> {
  if (tab.actor !== undefined) return await world.stage.wait(actor, sending())
  tab.actor = actor
  try {
    await sending()
  } finally {
    tab.actor = undefined
  }
}

/** Writes while the phone may be sending. */
async function recordWork(world: World, handset: Handset): Promise<Work> {
  const tab = handset.tabs[1] ?? (await handset.tab())
  const run = async (actor: Actor) => {
    const isFirst = tab.actor === undefined
    if (isFirst) tab.actor = actor
    try {
      const sent = () =>
        isFirst ? tab.phone.sender.idle() : world.stage.wait(actor, tab.phone.sender.idle())
      await writeSomething(world, handset, tab, sent)
    } finally {
      if (isFirst) tab.actor = undefined
    }
  }
  return { name: `${handset.name} writes`, run }
}

function deskWork(world: World, shop: SimShop): Work {
  const writer = world.draw.weighted(DESK_WRITERS)
  return {
    name: `desk ${writer.name}`,
    run: (actor) => world.atDesk(actor, () => writer.write(world, shop, world.draw)),
  }
}
