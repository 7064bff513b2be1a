import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { failureOf, wordName } from '@/lib/diag/book-index'
import { living, strikes } from '@/lib/diag/case'
import { explainCode } from '@/lib/diag/code-words'
import {
  bytesFromHex,
  DTC_VERSIONS,
  decodeDtc,
  encodeDtc,
  parsePcode,
  pcodeFromBytes,
  pcodeToBytes,
  printPcode,
} from '@/lib/diag/codes'
import { letsThrough, opens } from '@/lib/diag/gate'
import { advisePart, breakEven } from '@/lib/diag/part-choice'
import { checked, log } from './fixtures/entries'
import { smallIndex } from './fixtures/small-book'

describe('[F2] codes there and back', () => {
  it('[F2] every SPN, FMI and count survives all four versions', () => {
    const dtcs = fc.record({
      spn: fc.integer({ min: 0, max: 524287 }),
      fmi: fc.integer({ min: 0, max: 31 }),
      count: fc.option(fc.integer({ min: 0, max: 126 })),
      version: fc.constantFrom(...DTC_VERSIONS),
    })
    fc.assert(
      fc.property(dtcs, (dtc) => {
        const bytes = encodeDtc(dtc)
        expect(bytes.ok && decodeDtc(bytes.value, dtc.version)).toEqual({ ok: true, value: dtc })
      }),
      { seed: 1 },
    )
  })
  it('[F2] every two-byte code but the padding survives', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 65535 }), (n) => {
        const code = pcodeFromBytes(n >> 8, n & 255)
        expect(code.ok && pcodeToBytes(code.value)).toEqual([n >> 8, n & 255])
        expect(code.ok && parsePcode(printPcode(code.value).toLowerCase())).toEqual(code)
      }),
      { seed: 2 },
    )
  })
  it('[F2] what does not fit is refused by its field', () => {
    const dtc = { spn: 1, fmi: 1, count: 1, version: 4 as const }
    expect(encodeDtc({ ...dtc, spn: 524288 })).toMatchObject({
      problem: { kind: 'outOfRange', field: 'spn' },
    })
    expect(encodeDtc({ ...dtc, fmi: 32 })).toMatchObject({ problem: { field: 'fmi' } })
    expect(encodeDtc({ ...dtc, count: 127 })).toMatchObject({ problem: { field: 'count' } })
    expect(decodeDtc([1, 2, 3])).toMatchObject({ problem: { kind: 'wrongLength', got: 3 } })
    expect(bytesFromHex('0x44, ff:f4')).toEqual({ ok: true, value: [0x44, 0xff, 0xf4] })
    expect(bytesFromHex('44F')).toMatchObject({ problem: { kind: 'notBytes' } })
  })
})

describe('[F2] codes in plain words', () => {
  it('[F2] circuit, kind, and the faults the kind supports and argues against', () => {
    const words = explainCode(smallIndex, { format: 'spn', spn: 1268, fmi: 5 })
    expect(words).toMatchObject({
      title: 'SPN 1268 FMI 5',
      circuit: { id: 'coilCircuit', name: 'Coil circuit' },
      failure: { id: 'fmi5' },
      makersDiffer: false,
      unknown: false,
    })
    expect(words.kindSupports.map((f) => f.fault)).toEqual(['wire'])
    expect(words.kindArguesAgainst.map((f) => f.fault)).toEqual(['driver'])
  })
  it('[F2] a P-code goes the same way; a kind that is silent on roles names nobody', () => {
    expect(
      explainCode(smallIndex, { format: 'pcode', code: 'P0351' }).kindSupports.map((f) => f.fault),
    ).toEqual(['wire'])
    const silent = explainCode(smallIndex, { format: 'spn', spn: 1268, fmi: 31 })
    expect([silent.kindSupports, silent.kindArguesAgainst]).toEqual([[], []])
  })
  it('[F2] a pair with no SPN is still half decoded by its kind; an unknown one stays as entered', () => {
    const half = explainCode(smallIndex, { format: 'spn', spn: 77, fmi: 3 })
    expect(half).toMatchObject({
      circuit: null,
      failure: { id: 'fmi3' },
      unknown: false,
      makersDiffer: true,
    })
    expect(explainCode(smallIndex, { format: 'spn', spn: 77, fmi: 30 }).unknown).toBe(true)
    expect(explainCode(smallIndex, { format: 'flash', pattern: '2-4' })).toMatchObject({
      title: 'Flash code 2-4',
      unknown: true,
    })
    expect(explainCode(smallIndex, { format: 'asShown', text: 'E-17' })).toMatchObject({
      title: 'E-17',
      unknown: true,
      source: 'as shown',
    })
  })
  it('[F2] words and kinds are found by id', () => {
    expect(wordName(smallIndex, 'tool', 'jar')).toBe('Clear jar')
    expect(wordName(smallIndex, 'tool', 'hammer')).toBe('hammer')
    expect(failureOf(smallIndex, 'circuit')?.id).toBe('circuit')
    expect(failureOf(smallIndex, 'nothing')).toBeNull()
  })
})

describe('[R4] gates', () => {
  it.each([
    [{}, {}, 'open'],
    [{ fuelling: ['injection'] }, { fuelling: 'injection' }, 'open'],
    [{ fuelling: ['injection'] }, { fuelling: 'carburettor' }, 'shut'],
    [{ fuelling: ['injection'] }, {}, 'unknown'],
    [{ fuelling: ['injection'], strokes: ['two'] }, { strokes: 'four' }, 'shut'],
    [{ kind: ['atv', 'sideBySide'] }, { kind: 'sideBySide' }, 'open'],
  ] as const)('[R4] %j before %j is %s', (gate, features, want) => {
    const asGate = Object.fromEntries(Object.entries(gate).map(([k, v]) => [k, [...v]]))
    expect(opens(asGate, features)).toBe(want)
    expect(letsThrough(asGate, features)).toBe(want !== 'shut')
  })
})

describe('[R13] the log as evidence', () => {
  it('[R13] stands in the order of happening, whatever order it arrived in', () => {
    const entries = log(checked('a', 'good'), checked('b', 'good'), checked('c', 'good'))
    expect(living([...entries].reverse())).toEqual(entries)
    const [first, , last] = entries
    const earlier = { ...last!, happenedAt: '2026-11-24T17:00:00.000Z' }
    expect(living([first!, earlier]).map((e) => e.id)).toEqual([earlier.id, first!.id])
  })

  /** `wanted`: what is left of a log whose letters point at each other; x to z correct, the others replace. */
  it.each([
    ['a correction strikes', { a: null, x: 'a' }, []],
    ['a correction taken back strikes nothing', { a: null, x: 'a', y: 'x' }, ['a']],
    ['taken back once more it strikes again', { a: null, x: 'a', y: 'x', z: 'y' }, []],
    ['a replacement strikes', { a: null, b: 'a' }, ['b']],
    ['a corrected replacement strikes nothing', { a: null, b: 'a', x: 'b' }, ['a']],
    ['so does one whose correction was taken back', { a: null, b: 'a', x: 'b', y: 'x' }, ['b']],
    ['replaced twice leaves the newest', { a: null, b: 'a', c: 'b' }, ['c']],
    ['the newest corrected leaves the one before', { a: null, b: 'a', c: 'b', x: 'c' }, ['b']],
  ] as const)('[R8] %s', (_words, points: Record<string, string | null>, wanted) => {
    const entries = Object.entries(points).map(([id, supersedes]) => ({
      ...log(checked('a', 'good'))[0]!,
      id,
      supersedes,
      ...(id >= 'x' ? { body: { kind: 'correction', reason: 'Wrong' } as const } : {}),
    }))
    for (const order of [entries, [...entries].reverse()]) {
      expect(living(order).map(({ id }) => id)).toEqual(wanted)
      const struck = strikes(order)
      expect(entries.filter(({ id }) => id < 'x' && !struck.has(id)).map(({ id }) => id)).toEqual(
        wanted,
      )
    }
  })
})

describe('[F8] genuine or aftermarket', () => {
  const figures = {
    genuineMinor: 18_400,
    aftermarketMinor: 7_900,
    recoveryMinor: 64_000,
    genuineFails: 0.02,
  }
  it('[S8] 184.00 against 79.00 with a second recovery of 640: break-even 18.4; 12 takes the aftermarket part, 25 the genuine one', () => {
    expect(100 * breakEven(figures)).toBeCloseTo(18.4, 1)
    const low = advisePart({ ...figures, aftermarketFails: 0.12 })
    expect(low).toMatchObject({
      advised: 'aftermarket',
      expectedAftermarketMinor: expect.closeTo(15_580, 6),
      expectedGenuineMinor: expect.closeTo(19_680, 6),
    })
    expect(advisePart({ ...figures, aftermarketFails: 0.25 }).advised).toBe('genuine')
  })
  it('[S8] both sides of the break-even, the tie, and no figure', () => {
    const at = breakEven(figures)
    expect(advisePart({ ...figures, aftermarketFails: at - 1e-4 }).advised).toBe('aftermarket')
    expect(advisePart({ ...figures, aftermarketFails: at + 1e-4 }).advised).toBe('genuine')
    expect(advisePart({ ...figures, aftermarketFails: at }).advised).toBe('equal')
    expect(advisePart({ ...figures, aftermarketFails: null })).toMatchObject({
      advised: 'noFigure',
      expectedAftermarketMinor: null,
    })
  })
  it('[F8] stays within 0 and 1, also with a free recovery or a dearer copy', () => {
    expect(breakEven({ ...figures, recoveryMinor: 0 })).toBe(1)
    expect(breakEven({ ...figures, recoveryMinor: 0, aftermarketMinor: 18_400 })).toBe(0.02)
    expect(breakEven({ ...figures, aftermarketMinor: 90_000 })).toBe(0)
    expect(breakEven({ ...figures, recoveryMinor: 100 })).toBe(1)
  })
})
