// One run: the seed decides everything in it.
import type { SyncWorld } from '../../support/sync-world'
import { type Broken, BrokenRule } from './broken-rule'
import { holdAll, quieten } from './checks-end'
import { holdVisible, lookAtPhone } from './checks-phone'
import { holdDense } from './checks-shop'
import { backUp, COMMANDS, type Command, RACY_COMMANDS } from './commands'
import { Draw } from './draw'
import { emptyIfClosed } from './emptying'
import { forgetHandsets } from './handset'
import { World } from './world'

export const STEPS = 40
/** What is drawn for the line of each step: mostly none, sometimes bad. */
const FAULT_SHARES = [0, 0, 0.15, 0.4]
/** Steps shown with a failure. */
const SHOWN = 25

export type SeedOptions = {
  seed: number
  steps?: number
  /** Keeps the ids of a second run of the seed in one process apart. */
  salt?: number
  /** Rules that are not looked at; for the mutation check, so that the deepest one has to find it. */
  without?: ReadonlySet<string>
  /** Races for the most part. */
  isRacy?: boolean
}

export type SeedRun = {
  seed: number
  broken: Broken | null
  /** What was done, a line each. */
  trace: string[]
  figures: Map<string, number>
  faults: Map<string, number>
}

/** Runs a seed to its end or to the first promise that breaks. */
export async function runSeed(base: SyncWorld, options: SeedOptions): Promise<SeedRun> {
  const { seed, steps = STEPS, salt = 0, without = new Set() } = options
  const commands = options.isRacy === true ? RACY_COMMANDS : COMMANDS
  const world = await World.open(base, seed, salt)
  const trace: string[] = []
  let broken: Broken | null = null
  try {
    await backUp(world)
    for (let step = 0; step < steps; step++)
      await takeStep(world, { step, trace, without, commands })
    trace.push('quiet')
    await guarded(without, () => quieten(world))
    await guarded(without, () => holdAll(world))
    throwFound(world)
  } catch (cause) {
    broken =
      cause instanceof BrokenRule
        ? cause.broken
        : { rule: 'simulatorFails', what: String(cause), cause }
  } finally {
    await world.close().catch(() => undefined)
    forgetHandsets()
  }
  return { seed, broken, trace, figures: world.figures, faults: world.faults }
}

type Step = {
  step: number
  trace: string[]
  without: ReadonlySet<string>
  commands: readonly Command[]
}

async function takeStep(world: World, of: Step): Promise<void> {
  const { step, trace, without, commands } = of
  world.draw = new Draw(world.seed, step)
  world.requests = 0
  const { draw } = world
  const handset = draw.oneOf(world.handsets)
  const command = draw.weighted(commands)
  world.faultShare = draw.oneOf(FAULT_SHARES)
  const at = trace.push(`${step} ${handset.name} ${command.name}`) - 1
  await world.pass(draw.between(200, 9_000))
  const did = await command.run(world, handset)
  trace[at] += ` ${did}`
  if (command.name === 'race') trace[at] += `\n    ${world.stage.trail.join('\n    ')}`
  world.faultShare = 0
  for (const one of world.handsets) {
    for (const killedAt of await one.bury()) {
      world.fault('killed')
      trace[at] += ` [${one.name} killed at ${killedAt}]`
    }
    if (await emptyIfClosed(world, one)) trace[at] += ` [${one.name} emptied]`
  }
  world.count('steps')
  world.count(`did ${command.name}`)
  throwFound(world)
  await guarded(without, () => holdDense(world))
  for (const one of world.touched) {
    if (!world.handsets.includes(one)) continue
    await guarded(without, () => lookAtPhone(world, one))
    await guarded(without, () => holdVisible(world, one))
  }
  world.touched.clear()
}

async function guarded(without: ReadonlySet<string>, check: () => Promise<unknown>): Promise<void> {
  try {
    await check()
  } catch (cause) {
    if (!(cause instanceof BrokenRule) || !without.has(cause.broken.rule)) throw cause
  }
}

function throwFound(world: World): void {
  const [first] = world.found
  if (first !== undefined) throw new BrokenRule(first)
}

/** What a person needs to look into a failure: the promise, the last steps, and how to have it again. */
export function failureText(
  { seed, broken, trace }: SeedRun,
  { steps = STEPS, isRacy = false } = {},
): string {
  const more = `${steps === STEPS ? '' : ` --steps ${steps}`}${isRacy ? ' --racy' : ''}`
  const stack = broken?.cause instanceof Error ? `\n${broken.cause.stack}` : ''
  return [
    `seed ${seed}: ${broken?.rule}: ${broken?.what}${stack}`,
    ...trace.slice(-SHOWN).map((line) => `  ${line}`),
    `again: npm run sim -- --seed ${seed}${more}`,
  ].join('\n')
}
