// Runs the bars one after the other, each against its floor in turns, and writes docs/performance.md. Start
// it by `npm run bench:sync`, which builds what it needs.
import { parseArgs } from 'node:util'
import { type Bar, barsOfBrowser, barsOfCursor, barsOfIdle, barsOfLock, barsOfStorm } from './bars'
import { carryAll } from './browser'
import { tortureAll } from './cursor-torture'
import { measureIdle } from './idle'
import { LOADS, measureLocks } from './lock-held'
import { openPeers } from './peers'
import { machineOf, printed, writeReport } from './report'
import { openStage, type Stage } from './stage'
import { measureStorms } from './storm'

const { values } = parseArgs({
  options: {
    peers: { type: 'boolean', default: false },
    quick: { type: 'boolean', default: false },
    only: { type: 'string' },
  },
})
const { quick } = values
const wanted = values.only?.split(',')
const say = (words: string) => console.log(`[${new Date().toISOString().slice(11, 19)}] ${words}`)

type Part = { ids: string[]; run: (stage: Stage, peers: Record<string, string>) => Promise<Bar[]> }

/** In full size, or tiny to see that everything runs. */
const PARTS: Part[] = [
  {
    ids: ['B1'],
    run: async ({ db }) => barsOfCursor(await tortureAll(db, quick ? 10 : 80)),
  },
  {
    ids: ['B2', 'B3', 'B5', 'B6'],
    run: async (stage, peers) => {
      const size = { turns: quick ? 2 : 11, count: quick ? 60 : 500 }
      return barsOfBrowser(await carryAll(stage, { ...size, peers, say }))
    },
  },
  {
    ids: ['B4'],
    run: async (stage) => {
      const size = quick ? { turns: 2, each: 20 } : { turns: 21, each: 40 }
      return barsOfIdle(await measureIdle(stage, size))
    },
  },
  {
    ids: ['B7'],
    run: async (stage, peers) => {
      const size = quick ? { turns: 1, devices: 8 } : { turns: 11 }
      return barsOfStorm(await measureStorms(stage, { ...size, peers, say }))
    },
  },
  {
    ids: ['B8'],
    run: async (stage) => {
      const loads = quick ? LOADS.map((load) => ({ ...load, rounds: 2 })) : LOADS
      return barsOfLock(await measureLocks(stage, loads))
    },
  },
]

async function measure(stage: Stage, peers: Record<string, string>): Promise<Bar[]> {
  const bars: Bar[] = []
  for (const { ids, run } of PARTS) {
    if (wanted !== undefined && !ids.some((id) => wanted.includes(id))) continue
    const more = await run(stage, peers)
    bars.push(...more)
    say(`${ids.join(', ')} done\n${printed(more)}`)
  }
  return bars
}

const machine = machineOf()
const stage = await openStage()
try {
  const peers = values.peers ? await openPeers(stage.db.ownerUrl) : null
  try {
    const bars = await measure(stage, peers?.bases ?? {})
    if (!quick && wanted === undefined) writeReport({ bars, machine, withPeers: values.peers })
    const missed = bars.filter((bar) => bar.verdict === 'missed')
    say(`${bars.filter((bar) => bar.verdict === 'pass').length} passed, ${missed.length} missed`)
  } finally {
    await peers?.close()
  }
} catch (error) {
  console.error(stage.product.log(), stage.floor.log())
  throw error
} finally {
  await stage.close()
}
