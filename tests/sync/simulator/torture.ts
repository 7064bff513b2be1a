// The cursor torture (sync.md, bar B1): 16 writers with delays inside their transactions and 2 plain ones
// write at once into one shop, while a phone pulls. Real concurrency, so no two runs are the same.
import { asShop } from '@/db/client'
import { type LogCursor, type LogPage, pullPage } from '@/db/queries/change-log'
import { lockShop, takeChanges } from '@/db/queries/changes'
import { insertMachines } from '@/db/queries/machines'
import { machineOf, makeShop, newId, type TestShop } from '../../support/shop-fixture'
import { machineChange, numbersOf, seededDelays, wait } from '../../support/writers'

const WRITERS = 16
const PLAIN_WRITERS = 2
/** Large enough to keep up with the writers: one who lags behind them sees no cursor go wrong. */
const PAGE = 50

export type Torture = {
  written: number
  missed: number
  twice: number
  ghosts: number
  holes: number
}

class ChangedMyMind extends Error {}

/** Runs it; `rows`: how many each writer writes. A tenth of the delayed writes is rolled back. */
export async function torture({ rows, seed }: { rows: number; seed: number }): Promise<Torture> {
  const shop = await makeShop({ owner: ['owner'] })
  const delay = seededDelays(seed)
  const written = new Set<string>([shop.machineId])
  const writing: { isDone: boolean } = { isDone: false }
  const pulling = pullAlong(shop, writing)
  const slow = async (writer: number) => {
    for (let n = 0; n < rows; n++) {
      const id = newId()
      const rollsBack = delay(10) < 1
      await slowWrite(shop, id, { locks: writer % 2 === 0, rollsBack, delay })
      if (!rollsBack) written.add(id)
    }
  }
  const plain = async () => {
    for (let n = 0; n < rows; n++) {
      const id = newId()
      await plainWrite(shop, id)
      written.add(id)
    }
  }
  await Promise.all([
    ...Array.from({ length: WRITERS }, (_, writer) => slow(writer)),
    ...Array.from({ length: PLAIN_WRITERS }, plain),
  ])
  writing.isDone = true
  const pulled = await pulling
  const numbers = await numbersOf(shop)
  return {
    written: written.size,
    missed: [...written].filter((id) => !pulled.includes(id)).length,
    twice: pulled.length - new Set(pulled).size,
    ghosts: pulled.filter((id) => !written.has(id)).length,
    holes: (numbers.at(-1) ?? 0) - numbers.length,
  }
}

/** As the desk writes: says that it will write (or not), writes, takes its number, commits, all with pauses. */
async function slowWrite(
  shop: TestShop,
  id: string,
  how: { locks: boolean; rollsBack: boolean; delay: (most: number) => number },
): Promise<void> {
  const work = asShop(shop.id, async (tx) => {
    if (how.locks) await lockShop(tx)
    await insertMachines(tx, [machineOf(id)])
    await wait(how.delay(how.locks ? 2 : 12))
    await takeChanges(tx, [machineChange(id)])
    await wait(how.delay(12))
    if (how.rollsBack) throw new ChangedMyMind()
  })
  await work.catch((cause: unknown) => {
    if (!(cause instanceof ChangedMyMind)) throw cause
  })
}

function plainWrite(shop: TestShop, id: string): Promise<number> {
  return asShop(shop.id, async (tx) => {
    await insertMachines(tx, [machineOf(id)])
    return await takeChanges(tx, [machineChange(id)])
  })
}

/** Follows the pages until everybody is done, and once more; answers every machine it was told of. */
async function pullAlong(shop: TestShop, writing: { isDone: boolean }): Promise<string[]> {
  const personId = shop.people.owner?.id ?? ''
  const pulled: string[] = []
  let cursor: LogCursor | null = null
  const pull = (from: LogCursor | null): Promise<LogPage> =>
    asShop(shop.id, (tx) => pullPage(tx, { actor: { personId }, cursor: from, limit: PAGE }))
  for (;;) {
    const wasDone = writing.isDone
    const page = await pull(cursor)
    // A wrong cursor may be of the future to the next page: it starts over, as a phone would.
    cursor = page.kind === 'signIn' ? null : page.cursor
    if (page.kind !== 'page') continue
    pulled.push(...page.rows.filter((row) => row.entity === 'machine').map((row) => row.id))
    if (wasDone && !page.more) return pulled
  }
}
