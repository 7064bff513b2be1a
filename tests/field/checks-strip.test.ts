import { describe, expect, it } from 'vitest'
import { fixed, of100, twoDigits } from '@/components/reading-strip/figures'
import { labelPlaces } from '@/components/reading-strip/rule-drawing'
import { beamParts, niceStep, stripAxis, xOf } from '@/components/reading-strip/scale'
import {
  acrossOf,
  bandWords,
  distanceWords,
  type StripReading,
  stripSentence,
  verdictWords,
} from '@/components/reading-strip/verdict'

const stator = (shown: string, verdict: StripReading['verdict']): StripReading => ({
  shown,
  unit: 'V AC',
  overRange: false,
  quantity: 'acVoltage',
  estimate: Number(shown),
  expandedU: 0.9,
  limits: { low: 45, high: 60 },
  verdict,
  resolution: 0.1,
})

describe('the words of a reading strip', () => {
  it('[F4] says the example of the design language in one sentence', () => {
    expect(stripSentence(stator('27.4', 'outLow'))).toBe(
      '27.4 volts AC, plus or minus 0.9. Good band 45 to 60. Out, low, 17.6 under.',
    )
  })

  it('[F4] carries a verdict by words, never by colour alone', () => {
    expect(
      ['in', 'outLow', 'outHigh', 'tooClose', null].map((v) => verdictWords(v as never)),
    ).toEqual(['IN', 'OUT, LOW', 'OUT, HIGH', 'TOO CLOSE TO CALL', 'NO LIMIT TO JUDGE BY'])
  })

  it.each([
    ['52.1', 'in', '7.1 V clear'],
    ['45.3', 'tooClose', '0.3 V inside'],
    ['44.6', 'tooClose', '0.4 V under'],
    ['45.0', 'tooClose', 'on the limit'],
    ['27.4', 'outLow', '17.6 V under'],
    ['71.0', 'outHigh', '11.0 V over'],
  ] as const)('[F4] %s V is said as %s, %s', (shown, verdict, words) => {
    expect(distanceWords(stator(shown, verdict))).toBe(words)
  })

  it('[F4] names one-sided bands by their one limit', () => {
    expect(bandWords({ low: 12.4, high: null })).toBe('12.4 or more')
    expect(bandWords({ low: null, high: 0.1 })).toBe('0.1 or less')
    expect(bandWords({ low: 0.45, high: 0.1 + 0.45 })).toBe('0.45 to 0.55')
  })

  it('[F4] tells which jaw an undecided reading lies across', () => {
    const coil = { estimate: 0.55, expandedU: 0.3956, limits: { low: 0.45, high: 0.55 } }
    expect(acrossOf(coil)).toBe('both')
    expect(acrossOf(stator('45.3', 'tooClose'))).toBe('low')
    expect(acrossOf(stator('59.8', 'tooClose'))).toBe('high')
  })
})

describe('figures on the screen', () => {
  it.each([
    [0.3956, '0.40'],
    [0.09, '0.09'],
    [0.92, '0.9'],
    [1.72, '1.7'],
    [12.4, '12'],
  ])('shows an uncertainty of %s as %s', (value, text) => {
    expect(twoDigits(value).text).toBe(text)
  })

  it('uses the minus sign of the screen and never a minus zero', () => {
    expect(fixed(-15, 0)).toBe('−15')
    expect(fixed(-0.001, 1)).toBe('0.0')
  })

  it('[R5] never says 0 or 100 of 100 for what is only nearly so', () => {
    expect([0, 0.001, 0.193, 0.9741, 0.998, 1].map(of100)).toEqual([
      '0',
      'under 1',
      '19',
      '97',
      'over 99',
      '100',
    ])
  })
})

describe('the axis of a strip', () => {
  const base = { value: 52, halfWidth: 0.9, limits: { low: 45, high: 60 }, neverNegative: true }

  it('gives the band 45 to 65 of 100 of the width when the value is near', () => {
    const axis = stripAxis(base)
    const share = 15 / (axis.to - axis.from)
    expect(share).toBeGreaterThanOrEqual(0.45)
    expect(share).toBeLessThanOrEqual(0.65)
  })

  it.each([3, 27.4, 88, 400])('widens to hold the whole I-beam at %s', (value) => {
    const axis = stripAxis({ ...base, value })
    expect(axis.from).toBeLessThanOrEqual(Math.min(45, value - 0.9))
    expect(axis.to).toBeGreaterThanOrEqual(Math.max(60, value + 0.9))
  })

  it('does not go under zero where nothing can', () => {
    const coil = { value: 0.55, halfWidth: 0.7, limits: { low: 0.45, high: 0.55 } }
    expect(stripAxis({ ...coil, neverNegative: true }).from).toBe(0)
    expect(stripAxis({ ...coil, neverNegative: false }).from).toBeLessThan(0)
  })

  it('steps by 1, 2, 2.5 or 5', () => {
    expect([0.7, 1.1, 2.1, 2.6, 5.1, 0.021].map(niceStep)).toEqual([1, 2, 2.5, 5, 10, 0.025])
  })

  it('labels long ticks only, at whole steps', () => {
    const { ticks, step } = stripAxis({ ...base, value: 27.4 })
    const labelled = ticks.filter((tick) => tick.label !== null)
    expect(labelled.length).toBeGreaterThan(2)
    for (const tick of labelled) {
      expect(tick.kind).toBe('long')
      expect(Math.abs(tick.at / step - Math.round(tick.at / step))).toBeLessThan(1e-6)
    }
  })

  it('works with no limits and with one', () => {
    const free = stripAxis({ ...base, limits: null })
    expect(xOf(free, 52, 358)).toBeGreaterThan(100)
    const one = stripAxis({
      value: 12.18,
      halfWidth: 0.4,
      limits: { low: 12.4, high: null },
      neverNegative: false,
    })
    expect(one.from).toBeLessThan(12.18 - 0.4)
    expect(one.to).toBeGreaterThan(12.58)
  })
})

describe('the I-beam', () => {
  const axis = stripAxis({
    value: 52,
    halfWidth: 0.9,
    limits: { low: 45, high: 60 },
    neverNegative: true,
  })
  const box = { width: 358, minPx: 12 }

  it('is never under 12 px wide', () => {
    const [beam] = beamParts(axis, { value: 52, halfWidth: 0.001, limits: null }, box)
    expect((beam?.to ?? 0) - (beam?.from ?? 0)).toBeCloseTo(12, 6)
  })

  it('is hollow beyond the limit it lies across', () => {
    const parts = beamParts(
      axis,
      { value: 45.3, halfWidth: 0.9, limits: { low: 45, high: 60 } },
      box,
    )
    expect(parts.map((part) => part.hollow)).toEqual([true, false])
  })

  it('is hollow on both sides of a band that is narrower than it', () => {
    const limits = { low: 0.45, high: 0.55 }
    const coil = stripAxis({ value: 0.55, halfWidth: 0.3956, limits, neverNegative: true })
    const parts = beamParts(coil, { value: 0.54, halfWidth: 0.3956, limits }, box)
    expect(parts.map((part) => part.hollow)).toEqual([true, false, true])
  })

  it('is solid when it lies wholly outside', () => {
    const wide = stripAxis({
      value: 27.4,
      halfWidth: 0.9,
      limits: { low: 45, high: 60 },
      neverNegative: true,
    })
    const parts = beamParts(
      wide,
      { value: 27.4, halfWidth: 0.9, limits: { low: 45, high: 60 } },
      box,
    )
    expect(parts).toHaveLength(1)
    expect(parts[0]?.hollow).toBe(false)
  })
})

describe('the limit figures', () => {
  const marks = (a: number, b: number) => [
    { x: a, text: '0.45', side: -1 as const },
    { x: b, text: '0.55', side: 1 as const },
  ]

  it.each([
    [150, 190, 195],
    [0, 1, 350],
    [340, 355, 10],
    [170, 172, 171],
  ])('stay apart, on the strip and off the pointer at %s, %s, %s', (a, b, pointer) => {
    const [low, high] = labelPlaces(marks(a, b), 358, pointer)
    const half = 20
    expect((high?.x ?? 0) - (low?.x ?? 0)).toBeGreaterThanOrEqual(2 * half)
    expect(low?.x).toBeGreaterThanOrEqual(half - 1)
    expect(high?.x).toBeLessThanOrEqual(358 - half + 1)
  })
})
