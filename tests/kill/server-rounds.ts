// The product's own server dies with SIGKILL while phones push; started again, it is sent the same batches until
// they are taken. Nothing is lost, nothing doubled.
import { makeServer, type TestServer } from '../support/e2e/server'
import { openSyncWorld, phoneOf } from '../support/sync-world'
import { Draw } from '../sync/simulator/draw'
import { type Carry, FieldHand } from './field-hand'
import { holdAcknowledged, holdChains, holdDense, holdOnce, holdSeen, looking } from './shop-proof'
import { type Loop, pause, Tally } from './tally'

const HANDS = 6

/** Needs the production build. Throws with the promise that was broken; answers what it counted. */
export async function serverRounds({ rounds, seed, say }: Loop): Promise<Tally> {
  const tally = new Tally()
  const world = await openSyncWorld()
  try {
    const server = await makeServer()
    const hands: FieldHand[] = []
    for (let n = 0; n < HANDS; n += 1) {
      const phone = await phoneOf(world.a, n % 2 === 0 ? 'mechanic' : 'second')
      const draw = new Draw(seed, 100 + n)
      hands.push(new FieldHand({ ...phone, draw, carry: carryTo(server.base) }))
    }
    try {
      await server.start()
      const of = { server, shopId: world.a.id, adminUrl: world.db.adminUrl, hands, tally }
      for (let round = 1; round <= rounds; round += 1) {
        const words = await oneRound({ ...of, draw: new Draw(seed, round) })
        say(`round ${round}: ${words}`)
      }
    } finally {
      await server.close()
    }
    await holdChains(
      world.a.id,
      hands.flatMap((hand) => hand.jobs),
    )
    for (const hand of hands) holdSeen(hand)
    tally.add(
      'ops',
      hands.reduce((sum, hand) => sum + hand.made.length, 0),
    )
  } finally {
    await world.close()
  }
  return tally
}

const carryTo =
  (base: string): Carry =>
  async (request) =>
    await fetch(`${base}${new URL(request.url).pathname}`, {
      method: request.method,
      headers: request.headers,
      body: await request.arrayBuffer(),
    })

type Round = {
  server: TestServer
  shopId: string
  adminUrl: string
  hands: readonly FieldHand[]
  tally: Tally
  draw: Draw
}

async function oneRound(of: Round): Promise<string> {
  const { hands, draw } = of
  const first = await killWhile(of, (isOver) => hands.map((hand) => hand.push(isOver)))
  // Now and then once more, while the same batches are being sent again.
  const again = draw.chance(0.3)
    ? await killWhile(of, (isOver) => hands.map((hand) => hand.finish(isOver)))
    : null
  await Promise.all(hands.map((hand) => hand.finish()))
  await looking(of.adminUrl, async (ask) => {
    await holdOnce(ask, of.shopId, hands)
    await holdDense(ask, of.shopId)
  })
  await holdChains(
    of.shopId,
    hands.flatMap((hand) => hand.jobs.slice(-1)),
  )
  of.tally.add('rounds')
  return again === null ? first : `${first}; again ${again}`
}

/** Kills the server at a random moment of the work, looks what became of it, and starts it again. */
async function killWhile(
  of: Round,
  work: (isOver: () => boolean) => Promise<void>[],
): Promise<string> {
  const { server, hands, tally, draw } = of
  const afterMs = draw.between(15, 700)
  let isOver: boolean = false
  const works = work(() => isOver)
  await pause(afterMs)
  const flying = hands.filter((hand) => hand.inFlight).length
  isOver = true
  await server.kill()
  await Promise.all(works)
  const unsure = hands.reduce((sum, hand) => sum + hand.unsure.length, 0)
  const silent = await looking(of.adminUrl, async (ask) => {
    await holdDense(ask, of.shopId)
    return await holdAcknowledged(ask, of.shopId, hands)
  })
  await server.start()
  tally.add('kills')
  if (flying > 0) tally.add('hit pushes in the air')
  tally.add('unanswered ops', unsure)
  tally.add('of those taken all the same', silent)
  return `killed after ${afterMs} ms, ${flying} pushes in the air, ${unsure} ops unanswered, ${silent} of them taken`
}
