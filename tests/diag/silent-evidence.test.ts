// What says nothing takes nothing back, and silences nothing (docs/spec/diag.md).
import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { saysNothing, tableFactor } from '@/lib/diag/factor'
import { NTC_PER_KELVIN } from '@/lib/diag/reading-budget'
import { agrees, differenceU } from '@/lib/diag/twin-difference'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, checked, code, couldNot, log, ohms, pocketMeter } from './fixtures/entries'
import { coilSpec } from './fixtures/readings'

const beliefOf = (...bodies: LogBody[]) => belief(caseOf(log(...bodies), { meter: pocketMeter }))
const of = (...bodies: LogBody[]) =>
  Object.fromEntries(beliefOf(...bodies).suspects.map((s) => [s.fault, s.chance]))

describe('[E1] a check that could not be done again', () => {
  it('[E1] leaves the outcome recorded before it where it was', () => {
    const start = code(1268, 3)
    const bad = checked('plug', 'bad')
    expect(of(start, bad)).not.toEqual(of(start))
    expect(of(start, bad, couldNot('plug'))).toEqual(of(start, bad))
    expect(of(start, couldNot('plug'), bad)).toEqual(of(start, bad))
    expect(of(start, bad, couldNot('plug'), checked('plug', 'good'))).toEqual(
      of(start, checked('plug', 'good')),
    )
  })
})

describe('[R8] an outcome pressed by hand beside a reading', () => {
  const bare = ohms(1.9, { spec: null })
  const bad = checked('coilOhms', 'bad')
  it('[R8] counts where the reading has nothing to be held against', () => {
    expect(of(bare)).toEqual(of())
    expect(of(bare, bad)).toEqual(of(bad))
    expect(of(bad).coil).toBeGreaterThan(of().coil!)
  })
  it('[R8] does not count twice where the reading speaks', () => {
    expect(of(ohms(1.9), bad)).toEqual(of(ohms(1.9)))
  })
  it('[R17] nor where a good one reads the same, as the check then says nothing', () => {
    const shed = [ohms(1.2), ohms(1.2, { subject: 'knownGood' })]
    expect(of(...shed)).toEqual(of())
    expect(of(...shed, bad)).toEqual(of())
  })
})

describe('[R17] the temperature of suspect and twin', () => {
  const fine = { meterFunction: { percent: 0.1, digits: 1, resolution: 0.01 }, nulled: true }
  const hot = ohms(1.12, { ...fine, partTempC: null })
  const cold = ohms(1.0, { ...fine, partTempC: null, subject: 'knownGood' })
  it('[R17] a sound coil 30 K above its twin is not told from it by ohms alone', () => {
    // 1.00 ohm at 20 C reads 1.12 ohm at 50 C (copper, IEC 60028: 0.00393 per kelvin).
    expect(agrees(hot, cold)).toBe(true)
  })
  it('[R17] with both temperatures taken copper is corrected and no line is left', () => {
    const taken = ohms(1.12, { ...fine, partTempC: 50 })
    const twin = ohms(1.0, { ...fine, partTempC: 20, subject: 'knownGood' })
    expect(agrees(taken, twin)).toBe(true)
    expect(differenceU(taken, twin)).toBeLessThan(0.02)
    expect(differenceU(hot, cold)).toBeGreaterThan(0.05)
  })
  it('[R17] with one of them taken the other keeps its line', () => {
    const twin = ohms(1.0, { ...fine, partTempC: 20, subject: 'knownGood' })
    const apart = differenceU(hot, twin)
    expect(apart).toBeGreaterThan(0.05)
    expect(apart).toBeLessThan(differenceU(hot, cold))
  })
  it('[R7] an NTC keeps 1 K each, and how far apart the two were taken', () => {
    const spec = { ...coilSpec, material: 'ntc', partTempC: 20 } as const
    const at = (partTempC: number, subject: 'suspect' | 'knownGood') =>
      ohms(1000, { ...fine, spec, partTempC, subject })
    const alike = differenceU(at(20, 'suspect'), at(20, 'knownGood'))
    expect(alike).toBeCloseTo(Math.hypot(1000, 1000) * (NTC_PER_KELVIN / Math.sqrt(3)), 0)
    expect(differenceU(at(20, 'suspect'), at(30, 'knownGood'))).toBeGreaterThan(5 * alike)
  })
})

describe('[E1] an outcome between two others', () => {
  it('[E1] speaks of two faults together, though each alone makes it as likely as none does', () => {
    const table = {
      rows: new Map([
        [0, [0.2, 0.2, 0.6]],
        [1, [0.2, 0.2, 0.6]],
      ]),
      otherwise: [0.7, 0.2, 0.1],
    }
    const middle = tableFactor(table, [0, 1, 0])
    expect(middle.at([0, 1])).not.toBeCloseTo(middle.at([]), 2)
    expect(saysNothing(middle)).toBe(false)
    const lone = { ...table, rows: new Map([[0, [0.2, 0.2, 0.6]]]) }
    expect(saysNothing(tableFactor(lone, [0, 1, 0]))).toBe(true)
  })
})
