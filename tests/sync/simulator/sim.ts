// npm run sim -- [--seeds 1000] [--from 1] [--seed 7] [--steps 40] [--workers 2] [--racy] [--trace] [--mutations [--mutant NAME]]
import { fork } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { openSimBase } from './base'
import { huntAll } from './mutation-run'
import { failureText, runSeed, type SeedRun, STEPS } from './run-seed'

const { values } = parseArgs({
  options: {
    seed: { type: 'string' },
    seeds: { type: 'string', default: '100' },
    from: { type: 'string', default: '1' },
    steps: { type: 'string', default: String(STEPS) },
    workers: { type: 'string', default: '2' },
    trace: { type: 'boolean', default: false },
    child: { type: 'string' },
    mutant: { type: 'string' },
    racy: { type: 'boolean', default: false },
    mutations: { type: 'boolean', default: false },
  },
})
const steps = Number(values.steps)

/** What a child tells of one seed. */
type Told = {
  seed: number
  text: string | null
  figures: [string, number][]
  faults: [string, number][]
}

const toldOf = (run: SeedRun): Told => ({
  seed: run.seed,
  text: run.broken === null ? null : failureText(run, { steps, isRacy: values.racy }),
  figures: [...run.figures],
  faults: [...run.faults],
})

/** Runs the seeds `first`, `first + step` and so on, in a database of its own. */
async function runSeeds(seeds: readonly number[], tell: (told: Told) => void): Promise<void> {
  const base = await openSimBase()
  for (const seed of seeds) {
    const run = await runSeed(base, { seed, steps, isRacy: values.racy })
    if (values.trace) console.log(run.trace.join('\n'))
    tell(toldOf(run))
  }
  await base.close()
}

function child(seeds: readonly number[], tell: (told: Told) => void): Promise<void> {
  const file = fileURLToPath(import.meta.url)
  const process_ = fork(file, [
    '--child',
    seeds.join(','),
    '--steps',
    String(steps),
    ...(values.racy ? ['--racy'] : []),
  ])
  process_.on('message', (told) => tell(told as Told))
  return new Promise((resolve, reject) => {
    process_.on('exit', (code) =>
      code === 0 ? resolve() : reject(new Error(`a worker ended: ${code}`)),
    )
  })
}

const add = (sums: Map<string, number>, given: readonly [string, number][]) => {
  for (const [name, count] of given) sums.set(name, (sums.get(name) ?? 0) + count)
}
const listed = (sums: Map<string, number>) =>
  [...sums]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, count]) => `${name} ${count}`)
    .join(', ')

async function main(): Promise<void> {
  const count = values.seed === undefined ? Number(values.seeds) : 1
  const from = Number(values.seed ?? values.from)
  const seeds = Array.from({ length: count }, (_, index) => from + index)
  const workers = Math.min(Number(values.workers), count)
  const [figures, faults] = [new Map<string, number>(), new Map<string, number>()]
  const began = process.hrtime.bigint()
  const failed: number[] = []
  let done = 0
  const tell = (told: Told) => {
    done += 1
    add(figures, told.figures)
    add(faults, told.faults)
    if (told.text !== null) {
      failed.push(told.seed)
      console.log(told.text)
    }
    if (done % 25 === 0) console.log(`${done} of ${count} seeds, ${failed.length} failed`)
  }
  if (workers === 1) await runSeeds(seeds, tell)
  else {
    const shares = Array.from({ length: workers }, (_, n) =>
      seeds.filter((_seed, index) => index % workers === n),
    )
    await Promise.all(shares.map((share) => child(share, tell)))
  }
  const seconds = Number((process.hrtime.bigint() - began) / 1_000_000n) / 1000
  console.log(`figures: ${listed(figures)}`)
  console.log(`faults drawn: ${listed(faults)}`)
  console.log(
    `${count} seeds of ${steps} steps in ${seconds.toFixed(0)} s: ${failed.length} failed ${failed.join(' ')}`,
  )
  process.exit(failed.length === 0 && done === count ? 0 : 1)
}

/** Each wrong program has to be found within the seeds given. */
async function mutations(): Promise<void> {
  const seeds = Array.from({ length: Number(values.seeds) }, (_, n) => Number(values.from) + n)
  let missed = 0
  await huntAll(seeds, values.mutant, ({ mutant, foundBy, seeds: tried }) => {
    if (foundBy === null) missed += 1
    const how = foundBy === null ? 'NOT FOUND' : `found: ${foundBy.broken?.rule}`
    console.log(`${mutant.name} (${mutant.what}): ${how} after ${tried} seeds`)
    console.log(`  ${foundBy?.broken?.what ?? ''}`)
    if (values.trace && foundBy) console.log(failureText(foundBy))
  })
  process.exit(missed === 0 ? 0 : 1)
}

if (values.mutations) await mutations()
else if (values.child === undefined) await main()
else {
  await runSeeds(values.child.split(',').map(Number), (told) => process.send?.(told))
  process.exit(0)
}
