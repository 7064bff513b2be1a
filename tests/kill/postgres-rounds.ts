// PostgreSQL goes down under load, again and again; nothing is lost, nothing doubled, and all goes on by itself.
import { POST as postSync } from '@/app/api/sync/route'
import { openSyncWorld, phoneOf } from '../support/sync-world'
import { Draw } from '../sync/simulator/draw'
import { DeskHand } from './desk-hand'
import { FieldHand } from './field-hand'
import { OwnCluster, WAYS } from './own-cluster'
import { holdAcknowledged, holdChains, holdDense, holdOnce, holdSeen, looking } from './shop-proof'
import { broken, type Loop, pause, Tally } from './tally'

const HANDS = 5
const DESKS = 2

/** Runs so many restarts; throws with the promise that was broken. Answers what it counted. */
export async function postgresRounds({ rounds, seed, say }: Loop): Promise<Tally> {
  const tally = new Tally()
  const cluster = await OwnCluster.open()
  try {
    const world = await openSyncWorld(() => cluster.database())
    try {
      const hands: FieldHand[] = []
      for (let n = 0; n < HANDS; n += 1) {
        const phone = await phoneOf(world.a, n % 2 === 0 ? 'mechanic' : 'second')
        hands.push(new FieldHand({ ...phone, draw: new Draw(seed, 100 + n), carry: postSync }))
      }
      const desks = Array.from(
        { length: DESKS },
        (_, n) => new DeskHand(world.a, hands, new Draw(seed, 200 + n)),
      )
      const shopId = world.a.id
      for (let round = 1; round <= rounds; round += 1) {
        const of = { cluster, shopId, adminUrl: world.db.adminUrl, hands, desks, tally }
        const words = await oneRound({ ...of, draw: new Draw(seed, round), round })
        say(`round ${round}: ${words}`)
      }
      await holdChains(
        shopId,
        hands.flatMap((hand) => hand.jobs),
      )
      for (const hand of hands) holdSeen(hand)
      tally.add(
        'ops',
        hands.reduce((sum, hand) => sum + hand.made.length, 0),
      )
      tally.add(
        'desk writes',
        desks.reduce((sum, desk) => sum + desk.machines.done.length + desk.audits.done.length, 0),
      )
    } finally {
      await world.close()
    }
  } finally {
    await cluster.close()
  }
  return tally
}

type Round = {
  cluster: OwnCluster
  shopId: string
  adminUrl: string
  hands: readonly FieldHand[]
  desks: readonly DeskHand[]
  tally: Tally
  draw: Draw
  round: number
}

async function oneRound(of: Round): Promise<string> {
  const { cluster, shopId, hands, desks, tally, draw } = of
  const way = WAYS[(of.round - 1) % WAYS.length] ?? 'crash'
  const afterMs = draw.between(30, 400)
  const stop = { now: false, late: false }
  // Every other phone stops with the database, so that it is seen what became of its batch; the rest go on asking.
  const isOver = hands.map((_, n) => () => (n % 2 === 0 ? stop.now : stop.late))
  const works = [
    ...hands.map((hand, n) => hand.push(isOver[n] ?? (() => stop.now))),
    ...desks.map((desk) => desk.write(() => stop.now)),
  ]
  await pause(afterMs)
  const flying = hands.filter((hand) => hand.inFlight).length
  stop.now = true
  await cluster.restart(way)
  stop.late = true
  await Promise.all(works)

  const unsure = hands.reduce((sum, hand) => sum + hand.unsure.length, 0)
  const [silent, deskSilent] = await looking(of.adminUrl, async (ask) => {
    await holdDense(ask, shopId)
    const told = await holdAcknowledged(ask, shopId, hands)
    return [told, await Promise.all(desks.map((desk) => desk.hold(ask)))] as const
  })
  await Promise.all(hands.map((hand) => hand.finish()))
  await looking(of.adminUrl, async (ask) => {
    await holdDense(ask, shopId)
    await holdOnce(ask, shopId, hands)
    for (const desk of desks) await desk.hold(ask)
  })
  await holdChains(
    shopId,
    hands.flatMap((hand) => hand.jobs.slice(-1)),
  )
  if (hands.some((hand) => hand.unsure.length > 0)) broken('P16', 'a batch is still unsent')
  tally.add('rounds')
  tally.add(way)
  if (flying > 0) tally.add('hit pushes in the air')
  tally.add('unanswered ops', unsure)
  tally.add('of those taken all the same', silent)
  tally.add(
    'desk writes without a word',
    deskSilent.reduce((sum, count) => sum + count, 0),
  )
  return `${way} after ${afterMs} ms, ${flying} pushes in the air, ${unsure} ops unanswered, ${silent} of them taken`
}
