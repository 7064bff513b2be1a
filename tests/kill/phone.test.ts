import { expect, it } from 'vitest'
import { phoneRounds } from './phone-rounds'

it('[P1] [P8] [PH4] [fault 2] keeps all of a save or nothing when the browser is killed in ten waits of it', async () => {
  const say = (words: string) => console.log(words)
  const tally = await phoneRounds({ rounds: 10, seed: 1, every: false, say })
  console.log(tally.line())
  expect(tally.of('moments')).toBeGreaterThan(60)
  expect(tally.of('kills')).toBeGreaterThanOrEqual(9)
}, 400_000)
