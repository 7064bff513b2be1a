import { describe, expect, it } from 'vitest'
import { FMI_LINE } from '@/db/codebook/fmi'
import { FMI_UPPER } from '@/db/codebook/fmi-upper'
import { SPNS } from '@/db/codebook/spn'

const KINDS = [...FMI_LINE, ...FMI_UPPER]
const kind = (fmi: number) => KINDS.find((k) => k.fmi === fmi)

describe('SAE J1939-73 failure kinds (CHECKS 1.4)', () => {
  it.each([22, 23, 24, 25, 26, 27, 28, 29, 30])('[STD] FMI %i is kept free (memory)', (fmi) => {
    expect(kind(fmi)).toMatchObject({ failure: 'reserved', byRole: null })
  })
  it.each([
    [0, 'highSevere'],
    [1, 'lowSevere'],
    [2, 'erratic'],
    [3, 'voltHigh'],
    [4, 'voltLow'],
    [5, 'currentLow'],
    [6, 'currentHigh'],
    [7, 'mechanical'],
    [8, 'frequency'],
  ] as const)('[STD] FMI %i reads as the shop reads it: %s', (fmi, failure) => {
    expect(kind(fmi)?.failure).toBe(failure)
  })
  it('[STD] 3 speaks of high volts, 4 of a short to ground, 5 of an open, 6 of too much current', () => {
    const said = [3, 4, 5, 6].map((fmi) => `${kind(fmi)?.name} ${kind(fmi)?.supports}`)
    const words = [/high/, /ground/, /open/, /short/]
    expect(said.map((text, i) => words[i]?.test(text))).toEqual([true, true, true, true])
  })
})

describe('SAE J1939 numbers (CHECKS 1.5)', () => {
  it('[STD] 3509 is sensor supply 1, not the 3 of an open list (memory); its index is said to be from memory', () => {
    expect(SPNS.find((s) => s.spn === 3509)).toMatchObject({
      name: expect.stringMatching(/supply voltage 1 .*memory/),
      circuit: 'sensorSupply',
    })
  })
  it('[STD] no standard number means tip-over, and every number of the makers says that makers differ', () => {
    const makers = SPNS.filter((s) => s.spn >= 520_192 && s.spn <= 524_287)
    expect(makers.length).toBeGreaterThan(0)
    expect(makers.every((s) => s.makersDiffer)).toBe(true)
    expect(SPNS.filter((s) => s.spn < 520_192 && /tip-over|lean/i.test(s.name))).toEqual([])
  })
})
