import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { measureOffset, receiveHlc } from '@/lib/sync/client/hlc'
import { FIRST_HLC, nextHlc } from '@/lib/sync/protocol/hlc'
import { hlc } from '@/lib/sync/protocol/op'

describe('the hybrid clock (sync.md 3.4)', () => {
  test('a stamp is later than every one before, whatever the phone’s clock does', () => {
    const clock = fc.array(fc.integer({ min: -1000, max: 4_000_000_000_000 }), { minLength: 2 })
    fc.assert(
      fc.property(clock, (times) => {
        let last = FIRST_HLC
        for (const ms of times) {
          const next = nextHlc(last, ms)
          expect(next > last).toBe(true)
          expect(hlc.safeParse(next).success).toBe(true)
          last = next
        }
      }),
      { seed: 450, numRuns: 200 },
    )
  })

  test('counts up within a millisecond and carries over at the end of the counter', () => {
    expect(nextHlc('0000000003e8-0000', 1000)).toBe('0000000003e8-0001')
    expect(nextHlc('0000000003e8-ffff', 1000)).toBe('0000000003e9-0000')
    expect(nextHlc('0000000003e8-0007', 1001)).toBe('0000000003e9-0000')
  })

  test('moves up to a later clock it hears of and ignores an earlier one', () => {
    expect(receiveHlc('0000000003e8-0004', 2000)).toBe('0000000007d0-0000')
    expect(receiveHlc('0000000003e8-0004', 500)).toBe('0000000003e8-0004')
  })

  test('takes a new offset only when the held one cannot be true', () => {
    const trip = { sentMs: 1000, receivedMs: 1600, serverMs: 1_001_300 }
    expect(measureOffset({ held: undefined, ...trip })).toBe(1_000_000)
    expect(measureOffset({ held: 1_000_250, ...trip })).toBe(1_000_250)
    expect(measureOffset({ held: 1_000_301, ...trip })).toBe(1_000_000)
    expect(measureOffset({ held: 0, ...trip })).toBe(1_000_000)
  })
})
