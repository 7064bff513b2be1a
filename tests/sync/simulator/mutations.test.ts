import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SyncWorld } from '../../support/sync-world'
import { openSimBase } from './base'
import { heal, infect, MUTANTS } from './mutants'
import { hunt } from './mutation-run'
import { torture } from './torture'

const ROWS = 12
/** Tries of the torture for a wrong cursor to lose something in; the first does as a rule. */
const TRIES = 5
const SEEDS = Array.from({ length: 40 }, (_, index) => index + 1)

describe('[P7] the cursor torture', () => {
  let base: SyncWorld
  beforeAll(async () => {
    base = await openSimBase()
  })
  afterAll(() => base.close())

  it('[P7] misses, repeats and invents nothing with 16 writers and 2 plain ones', async () => {
    const { written, ...wrong } = await torture({ rows: ROWS, seed: 20261201 })
    expect(wrong).toEqual({ missed: 0, twice: 0, ghosts: 0, holes: 0 })
    expect(written).toBeGreaterThan(16 * ROWS * 0.7)
  })
})

describe('[P7] the torture on wrong cursors', () => {
  it.each(MUTANTS.filter((mutant) => mutant.isCursor))(
    'loses rows when $what',
    async (mutant) => {
      const base = await openSimBase()
      try {
        await infect(base.db, mutant)
        let missed = 0
        for (let n = 0; missed === 0 && n < TRIES; n++) {
          missed += (await torture({ rows: ROWS, seed: n })).missed
        }
        expect(missed).toBeGreaterThan(0)
      } finally {
        heal()
        await base.close()
      }
    },
    120_000,
  )
})

describe('[P4] [P7] the simulator on wrong programs', () => {
  it.each(MUTANTS)(
    'breaks a promise when $what',
    async (mutant) => {
      const { foundBy } = await hunt(mutant, SEEDS)
      expect(foundBy?.broken?.rule).toMatch(mutant.breaks)
    },
    240_000,
  )
})
