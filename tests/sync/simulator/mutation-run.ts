// Runs the mutants until each has been found.
import { openSimBase } from './base'
import { heal, infect, MUTANTS, type Mutant } from './mutants'
import { runSeed, type SeedRun } from './run-seed'

export type Verdict = { mutant: Mutant; foundBy: SeedRun | null; seeds: number }

/** Tries seeds on a wrong program until one finds it, or `most` have not. */
export async function hunt(mutant: Mutant, seeds: readonly number[]): Promise<Verdict> {
  const base = await openSimBase()
  try {
    await infect(base.db, mutant)
    let tried = 0
    for (const seed of seeds) {
      tried += 1
      const run = await runSeed(base, {
        seed,
        salt: 1,
        isRacy: true,
        without: new Set(mutant.without),
      })
      if (run.broken?.rule === 'simulatorFails') throw run.broken.cause
      if (run.broken !== null) return { mutant, foundBy: run, seeds: tried }
    }
    return { mutant, foundBy: null, seeds: tried }
  } finally {
    heal()
    await base.close()
  }
}

/** Every mutant in turn, or the one of that name. */
export async function huntAll(
  seeds: readonly number[],
  only: string | undefined,
  tell: (verdict: Verdict) => void,
): Promise<void> {
  for (const mutant of MUTANTS) {
    if (only === undefined || mutant.name === only) tell(await hunt(mutant, seeds))
  }
}
