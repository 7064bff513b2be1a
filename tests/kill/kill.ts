// One of the loops of npm run kill: --only server|postgres|phone [--rounds 50] [--seed 7] [--brief]
import { parseArgs } from 'node:util'
import { phoneRounds } from './phone-rounds'
import { postgresRounds } from './postgres-rounds'
import { serverRounds } from './server-rounds'
import type { Loop, Tally } from './tally'

const { values } = parseArgs({
  options: {
    rounds: { type: 'string', default: '50' },
    only: { type: 'string', default: '' },
    seed: { type: 'string', default: String(Date.now() % 1_000_000) },
    /** The phone at some moments only, as in the tests. */
    brief: { type: 'boolean', default: false },
  },
})

const loops: Record<string, (of: Loop) => Promise<Tally>> = {
  server: serverRounds,
  postgres: postgresRounds,
  phone: (of) => phoneRounds({ ...of, every: !values.brief }),
}

async function main(): Promise<number> {
  const { only } = values
  const loop = loops[only]
  if (loop === undefined) {
    console.error('usage: npm run kill -- [--rounds 50] [--only server|postgres|phone] [--seed 7]')
    return 2
  }
  const [rounds, seed] = [Number(values.rounds), Number(values.seed)]
  const say = (words: string) => console.log(`${only} ${words}`)
  say(`seed ${seed}`)
  try {
    const tally = await loop({ rounds, seed, say })
    say(`kept every promise: ${tally.line()}`)
    return 0
  } catch (error) {
    console.error(`${only} BROKE with seed ${seed}:`, error)
    return 1
  }
}

// Told to stop: the handlers of "exit" end what is running.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const)
  process.on(signal, () => process.exit(1))
process.exit(await main())
