// Values of one field written by several phones that had not heard of each other (M1 to M5).
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { FieldWrite } from '@/db/queries/field-history'
import { hlcAt } from '@/lib/sync/protocol/hlc'
import { mergeWrite, type NewWrite } from '@/lib/sync/server/field-merge'

const NOW = Date.UTC(2026, 10, 24, 18, 40)
const MINUTE = 60_000

type Made = Partial<NewWrite> & { value: unknown; device: string; at: number }
let made = 0
const write = ({ device, at, ...rest }: Made): NewWrite => {
  made += 1
  return {
    id: `w${String(made).padStart(4, '0')}`,
    hlc: hlcAt(at),
    base: 10,
    hasRow: true,
    deviceId: device,
    dseq: made,
    personId: `person of ${device}`,
    ...rest,
  }
}

/** Takes writes one after the other; each arrival moves the shop's number on. */
function take(writes: readonly NewWrite[], field = 'weather', nowMs = NOW + 10 * MINUTE) {
  let held: FieldWrite[] = []
  let seq = 20
  const results = writes.map((one) => {
    const merged = mergeWrite(held, one, { field, at: { nowMs, seq } })
    seq += 1
    const changed = new Map(merged.changed.map((other) => [other.id, other]))
    held = [...held.filter((other) => !changed.has(other.id)), ...changed.values()]
    return merged
  })
  const of = (state: FieldWrite['state']) =>
    held
      .filter((one) => one.state === state)
      .map((one) => one.value)
      .sort()
  return { results, held, stands: of('current'), lost: of('lost') }
}

describe('two phones, one field', () => {
  it('[M1] [fault 15] the later one stands in whatever order they arrive, and the other is kept', () => {
    const one = write({ value: 'fog', device: 'a', at: NOW })
    const two = write({ value: 'snow', device: 'b', at: NOW + MINUTE })
    for (const order of [
      [one, two],
      [two, one],
    ]) {
      expect(take(order)).toMatchObject({ stands: ['snow'], lost: ['fog'] })
    }
  })

  it('[M2] both are told of the same loser', () => {
    const one = write({ value: 'fog', device: 'a', at: NOW })
    const two = write({ value: 'snow', device: 'b', at: NOW + MINUTE })
    expect(take([one, two]).results.map(({ loser }) => loser?.value)).toEqual([undefined, 'fog'])
    expect(take([two, one]).results.map(({ loser }) => loser?.value)).toEqual([undefined, 'fog'])
  })

  it('[M1] at the same moment the device decides, the same way everywhere', () => {
    const one = write({ value: 'fog', device: 'a', at: NOW })
    const two = write({ value: 'snow', device: 'b', at: NOW })
    expect(take([one, two]).stands).toEqual(['snow'])
    expect(take([two, one]).stands).toEqual(['snow'])
  })

  it('[M1] the same value twice is no loss', () => {
    const one = write({ value: { a: 1, b: 2 }, device: 'a', at: NOW })
    const two = write({ value: { b: 2, a: 1 }, device: 'b', at: NOW + MINUTE })
    expect(take([one, two])).toMatchObject({ lost: [] })
  })

  it('[M3] whoever had seen a value comes after it, even by a slow clock, and nothing is lost', () => {
    const one = write({ value: 'fog', device: 'a', at: NOW })
    const two = write({ value: 'snow', device: 'b', at: NOW - 30 * MINUTE, base: 21 })
    const done = take([one, two])
    expect(done).toMatchObject({ stands: ['snow'], lost: [] })
    expect(done.held.find(({ value }) => value === 'snow')?.clockOdd).toBe(true)
  })

  it('[M1] any order of any phones’ writes leaves the same value and the same losers', () => {
    const phone = fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 1, maxLength: 3 })
    fc.assert(
      fc.property(
        fc.array(phone, { minLength: 2, maxLength: 4 }),
        fc.infiniteStream(fc.nat()),
        (phones, picks) => {
          const queues = phones.map((times, n) => {
            // A phone's own stamps only grow (P2).
            const sorted = times.toSorted((a, b) => a - b)
            return sorted.map((minute, k) =>
              write({ value: `${n}-${k}`, device: `d${n}`, at: NOW + minute * MINUTE + k }),
            )
          })
          const late = NOW + 60 * MINUTE
          const straight = take(queues.flat(), 'place', late)
          const waiting = queues.map((queue) => [...queue])
          const mixed: NewWrite[] = []
          while (mixed.length < queues.flat().length) {
            const open = waiting.filter((queue) => queue.length > 0)
            const next = open[(picks.next().value ?? 0) % open.length]?.shift()
            if (next) mixed.push(next)
          }
          const other = take(mixed, 'place', late)
          expect(other.stands).toEqual(straight.stands)
          expect(other.lost).toEqual(straight.lost)
        },
      ),
      { seed: 1512, numRuns: 300 },
    )
  })
})

describe('clocks that are wrong [fault 14]', () => {
  it('[M5] three days ahead: taken and marked, and the other phone’s later edit stands', () => {
    const ahead = write({ value: 'fog', device: 'a', at: NOW + 3 * 24 * 60 * MINUTE })
    const first = mergeWrite([], ahead, { field: 'weather', at: { nowMs: NOW, seq: 20 } })
    expect(first).toMatchObject({ stands: true, changed: [{ clockOdd: true }] })
    expect(first.changed[0]?.claimedHlc).toBe(ahead.hlc)
    const later = write({ value: 'snow', device: 'b', at: NOW + 2 * MINUTE })
    const at = { nowMs: NOW + 2 * MINUTE, seq: 21 }
    expect(mergeWrite(first.changed, later, { field: 'weather', at }).stands).toBe(true)
  })

  it('[M5] a year behind: taken as it is', () => {
    const old = write({ value: 'fog', device: 'a', at: NOW - 365 * 24 * 60 * MINUTE })
    expect(take([old])).toMatchObject({ stands: ['fog'] })
  })

  it('[M5] one phone’s own order holds whatever its clock did between', () => {
    const one = write({ value: 'one', device: 'a', at: NOW + 3 * 24 * 60 * MINUTE, dseq: 1 })
    const two = write({ value: 'two', device: 'a', at: NOW - 24 * 60 * MINUTE, dseq: 2 })
    expect(take([one, two])).toMatchObject({ stands: ['two'], lost: [] })
    // An op that was held up and comes after its successor changes nothing.
    expect(take([two, one])).toMatchObject({ stands: ['two'], lost: [] })
  })
})

describe('what a life may hang on', () => {
  const one = write({ value: 'gate', device: 'a', at: NOW })
  const two = write({ value: 'ridge', device: 'b', at: NOW + MINUTE })
  const knowing = (value: string) => write({ value, device: 'c', at: NOW + 5 * MINUTE, base: 30 })

  it('[M4] a newer place by one who knew of both does not hide the one that did not stand', () => {
    expect(take([one, two, knowing('hut')], 'place')).toMatchObject({
      stands: ['hut'],
      lost: ['gate'],
    })
  })

  it('[M4] of a lesser field it does: who knew of both has decided', () => {
    expect(take([one, two, knowing('sleet')], 'weather')).toMatchObject({
      stands: ['sleet'],
      lost: [],
    })
  })

  it('[M4] the writer’s own newer place gives the older one up', () => {
    const again = write({ value: 'gate, north side', device: 'a', at: NOW + 2 * MINUTE })
    for (const order of [
      [one, two, again],
      [one, again, two],
      [two, one, again],
    ]) {
      expect(take(order, 'place')).toMatchObject({ stands: ['gate, north side'], lost: ['ridge'] })
    }
  })
})
