// The bars of the sync part and what was measured against them. Ratios are taken turn by turn, floor and
// product one after the other, and their median is what counts.
import type { Carried } from './browser'
import type { Torture } from './cursor-torture'
import { digits, median, quantile, ratios, spread, summary } from './figures'
import type { Idle, IdleArm } from './idle'
import type { Held, LockLoad } from './lock-held'
import { NOTE_KINDS, type NoteKind } from './records'
import { CROWDS, type Crowd, type Storm, unfairness } from './storm'

/** `-`: no bar, told for comparison. */
export type Bar = {
  id: string
  what: string
  bar: string
  measured: string
  n: string
  verdict: 'pass' | 'missed' | '-'
}

const verdict = (isHeld: boolean): Bar['verdict'] => (isHeld ? 'pass' : 'missed')
const kB = (bytes: number) => `${digits(bytes / 1000)} kB`

/** B1: every count is nought for the product; the naive cursors stand beside it. */
export function barsOfCursor(told: readonly Torture[]): Bar[] {
  return told.map((one): Bar => {
    const isOurs = one.holes !== null
    const sum = one.missed + one.doubled + one.ghosts + (one.holes ?? 0)
    const share = ((100 * one.missed) / one.written).toFixed(1)
    const holes = one.holes === null ? '' : `, ${one.holes} holes`
    return {
      id: 'B1',
      what: `${one.name}, ${one.writers} ${one.writers === 2 ? 'plain ' : ''}writers`,
      bar: isOurs ? '0 missed, double, ghost or hole' : '-',
      measured: `${one.missed} missed (${share} %), ${one.doubled} double, ${one.ghosts} ghosts${holes}`,
      n: `${one.written} rows`,
      verdict: isOurs ? verdict(sum === 0) : '-',
    }
  })
}

type Way = 'push' | 'pull'
/** Seconds on a line of 600 ms a request and 50 kbit/s, everything that crossed it counted. */
const slowLineSeconds = ({ requests, all }: Carried['push']) => requests * 0.6 + (all * 8) / 50_000

export function barsOfBrowser(carried: readonly Carried[]): Bar[] {
  const arms = [...new Set(carried.map(({ arm }) => arm))]
  const of = (arm: string, kind: NoteKind) =>
    carried.filter((one) => one.arm === arm && one.kind === kind)
  return [
    ...NOTE_KINDS.flatMap((kind) =>
      arms.map((arm) => crossedBar(arm, kind, 'push', of(arm, kind))),
    ),
    ...NOTE_KINDS.flatMap((kind) =>
      arms.map((arm) => crossedBar(arm, kind, 'pull', of(arm, kind))),
    ),
    ...(['push', 'pull'] as const).flatMap((way) =>
      arms.map((arm) => slowLineBar(arm, way, of(arm, 'phrases'))),
    ),
    ...arms.map((arm) => browserBar(arm, 'push', { of: of(arm, 'phrases'), all: carried })),
    ...arms.map((arm) => browserBar(arm, 'pull', { of: of(arm, 'phrases'), all: carried })),
  ]
}

const MOST_KB = { push: { phrases: 30, random: 50 }, pull: { phrases: 25, random: null } } as const

function crossedBar(arm: string, kind: NoteKind, way: Way, told: readonly Carried[]): Bar {
  const requests = Math.max(...told.map((one) => one[way].requests))
  const bytes = (part: 'bodies' | 'all' | 'up' | 'down') =>
    median(told.map((one) => one[way][part]))
  const most = MOST_KB[way][kind]
  const hasBar = arm === 'product' && most !== null
  const parts = `${kB(bytes('up'))} up, ${kB(bytes('down'))} down; with headers ${kB(bytes('all'))}`
  return {
    id: way === 'push' ? 'B2' : 'B3',
    what: `${arm}, ${way}, ${kind}`,
    bar: hasBar ? `<= 2 requests, <= ${most} kB` : '-',
    measured: `${requests} ${requests === 1 ? 'request' : 'requests'}, ${kB(bytes('bodies'))} (${parts})`,
    n: String(told.length),
    verdict: hasBar ? verdict(requests <= 2 && bytes('bodies') <= most * 1000) : '-',
  }
}

const MOST_SECONDS = { push: 6, pull: 5.5 } as const

function slowLineBar(arm: string, way: Way, told: readonly Carried[]): Bar {
  const seconds = median(told.map((one) => slowLineSeconds(one[way])))
  const isOurs = arm === 'product'
  return {
    id: 'B5',
    what: `${arm}, ${way}`,
    bar: isOurs ? `<= ${MOST_SECONDS[way]} s` : '-',
    measured: `${digits(seconds)} s`,
    n: String(told.length),
    verdict: isOurs ? verdict(seconds <= MOST_SECONDS[way]) : '-',
  }
}

function browserBar(
  arm: string,
  way: Way,
  { of, all }: { of: readonly Carried[]; all: readonly Carried[] },
): Bar {
  const msOf = (name: string) =>
    all.filter((one) => one.arm === name && one.kind === 'phrases').map((one) => one[way].ms)
  const own = of.map((one) => one[way].ms)
  const against = summary(ratios(own, msOf('floor')))
  const isBar = arm === 'product' && way === 'push'
  const others = ['rxdb', 'pouchdb'].map(msOf).filter((ms) => ms.length > 0)
  const isQuickest = others.every((ms) => median(own) < median(ms))
  return {
    id: 'B6',
    what: `${arm}, ${way} in Chromium`,
    bar: isBar ? '<= 1.5 x the floor, quicker than both peers' : '-',
    measured: `${spread(summary(own), ' ms')}, ${spread(against)} x the floor`,
    n: String(own.length),
    verdict: isBar ? verdict(against.median <= 1.5 && isQuickest) : '-',
  }
}

/** B4: the median request of each turn against the floor's of the same turn. */
export function barsOfIdle({ turns, bytes }: Idle): Bar[] {
  const medians = (arm: IdleArm) => turns.map((turn) => median(turn[arm]))
  const all = (arm: IdleArm) => summary(turns.flatMap((turn) => turn[arm]))
  const n = `${turns.length} x ${turns[0]?.floor.length ?? 0}`
  const against = summary(ratios(medians('product'), medians('signedFloor')))
  const bare = summary(ratios(medians('product'), medians('floor')))
  const row = (arm: IdleArm, what: string): Bar => ({
    id: 'B4',
    what,
    bar: '-',
    measured: spread(all(arm), ' ms'),
    n,
    verdict: '-',
  })
  return [
    {
      id: 'B4',
      what: 'idle exchange, signature checked on both sides',
      bar: '1 request, <= 1.3 x the floor',
      measured: `1 request, ${spread(against)} x; bodies ${bytes.up} B up, ${bytes.down} B down`,
      n,
      verdict: verdict(against.median <= 1.3),
    },
    {
      ...row('product', 'idle exchange against a floor without a signature'),
      measured: `${spread(bare)} x`,
    },
    row('product', 'product, idle'),
    row('signedFloor', 'floor, idle, signature checked'),
    row('floor', 'floor, idle'),
  ]
}

const MOST_RATIO: Record<Crowd, number> = { '50 shops': 1.6, 'one shop': 2.2 }

/** B7: the whole storm against the floor's of the same turn; fairness among its devices. */
export function barsOfStorm(storms: readonly Storm[]): Bar[] {
  const arms = [...new Set(storms.map(({ arm }) => arm))]
  const of = (arm: string, crowd: Crowd) =>
    storms.filter((one) => one.arm === arm && one.crowd === crowd)
  const whole = (arm: string, crowd: Crowd) => of(arm, crowd).map((one) => one.wholeMs)
  const rows = CROWDS.flatMap((crowd) =>
    arms.map((arm): Bar => {
      const against = summary(ratios(whole(arm, crowd), whole('floor', crowd)))
      const each = of(arm, crowd).flatMap(({ eachMs }) => eachMs)
      const again = of(arm, crowd).reduce((sum, one) => sum + one.again, 0)
      const most = MOST_RATIO[crowd]
      const isOurs = arm === 'product'
      return {
        id: 'B7',
        what: `${arm}, ${crowd}`,
        bar: isOurs ? `<= ${most} x the floor` : '-',
        measured: `${spread(against)} x; whole ${spread(summary(whole(arm, crowd)), ' ms')}, a device p50 ${digits(quantile(each, 0.5))}, p95 ${digits(quantile(each, 0.95))} ms; ${again} sent again`,
        n: String(against.n),
        verdict: isOurs ? verdict(against.median <= most) : '-',
      }
    }),
  )
  return [...rows, ...CROWDS.map((crowd) => fairnessBar(crowd, of('product', crowd)))]
}

function fairnessBar(crowd: Crowd, storms: readonly Storm[]): Bar {
  const unfair = summary(storms.map(unfairness))
  return {
    id: 'B7',
    what: `product, ${crowd}, fairness: p95 of the devices over their p50`,
    bar: '<= 2',
    measured: spread(unfair),
    n: String(unfair.n),
    verdict: verdict(unfair.median <= 2),
  }
}

/** B8: judged by every load; the time between statements is our own process's. */
export function barsOfLock(told: readonly { load: LockLoad; held: readonly Held[] }[]): Bar[] {
  return told.map(({ load, held }): Bar => {
    const whole = held.map(({ heldMs }) => heldMs)
    const own = quantile(
      held.map(({ ownMs }) => ownMs),
      0.95,
    )
    const waited = quantile(
      held.map(({ waitMs }) => waitMs),
      0.95,
    )
    const p95 = quantile(whole, 0.95)
    const statements = median(held.map((one) => one.statements))
    return {
      id: 'B8',
      what: `counter held, ${load.name}`,
      bar: 'p95 <= 5 ms',
      measured: `p50 ${digits(median(whole))}, p95 ${digits(p95)} ms (${digits(own)} ms of it between statements), ${statements} statements; waited for p95 ${digits(waited)} ms`,
      n: String(held.length),
      verdict: verdict(p95 <= 5),
    }
  })
}
