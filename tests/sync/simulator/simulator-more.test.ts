import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SyncWorld } from '../../support/sync-world'
import { openSimBase } from './base'
import { failureText, runSeed } from './run-seed'

/** Run at every `npm test`; `npm run sim` runs any number. */
const SEEDS = 25

let base: SyncWorld
beforeAll(async () => {
  base = await openSimBase()
})
afterAll(() => base.close())

describe('[P1] [P4] [P7] [P8] [P9] [P11] [P12] the simulator, second half', () => {
  it.each(Array.from({ length: SEEDS }, (_, index) => index + 26))(
    'breaks no promise in the run of seed %i',
    async (seed) => {
      const run = await runSeed(base, { seed })
      if (run.broken !== null) expect.fail(failureText(run))
      expect(run.figures.get('steps')).toBe(40)
    },
    60_000,
  )
})
