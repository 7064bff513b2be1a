import { expect, it } from 'vitest'
import { postgresRounds } from './postgres-rounds'

it('[fault 5] [P4] loses and doubles nothing when PostgreSQL goes down under load ten times', async () => {
  const tally = await postgresRounds({ rounds: 10, seed: 1, say: (words) => console.log(words) })
  console.log(tally.line())
  expect(tally.of('rounds')).toBe(10)
  expect(tally.of('hit pushes in the air')).toBeGreaterThanOrEqual(5)
  expect(tally.of('ops')).toBeGreaterThan(200)
}, 300_000)
