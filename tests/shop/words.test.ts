import { describe, expect, it } from 'vitest'
import { adviceWords } from '@/components/desk/parts/advice-words'
import { machineName } from '@/components/field/words'
import { adviceSentences } from '@/components/parts/part-advice'
import { type Machine, machineWords } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'
import { currencyPlaces, moneyWords } from '@/lib/shop/currency'
import { aftermarketWords, breakEvenWords } from '@/lib/shop/part-words'

const machine: Machine = {
  id: 'm1',
  modelId: 'x1',
  unitNumber: '14',
  makerTyped: 'as typed',
  modelTyped: null,
  year: null,
  serial: null,
  hours: null,
  features: { kind: 'atv' },
  fleet: true,
}
const model = { id: 'x1', maker: 'Tarnholt', model: 'Moor 450' } as MachineModel

describe('[F1] a machine is called alike on phone, desk and in letters', () => {
  it.each([
    [{ unitNumber: '14', maker: 'Tarnholt', model: 'Moor 450' }, 'Unit 14, Tarnholt Moor 450'],
    [{ unitNumber: null, makerTyped: 'Tarnholt', modelTyped: null }, 'Tarnholt'],
    [{ unitNumber: '14', makerTyped: null }, 'Unit 14'],
    [{}, 'Machine without a name'],
  ])('[F1] %j is %s', (called, words) => {
    expect(machineWords(called)).toBe(words)
  })

  it('[F1] the phone takes the words of the model, and of what was typed without one', () => {
    expect(machineName(machine, [model])).toBe('Unit 14, Tarnholt Moor 450')
    expect(machineName(machine, [])).toBe('Unit 14, as typed')
  })
})

describe('[F8] the advice on a part is said alike where it is given and where it is read', () => {
  const advice = {
    advised: 'noFigure' as const,
    genuineMinor: 13_500,
    aftermarketMinor: 6_000,
    genuineFails: 0.01,
    aftermarketFails: null,
    recoveryMinor: 20_000,
    breakEven: 0.3871,
  }

  it('[F8] break-even and the missing figure', () => {
    const desk = adviceWords(advice, 'USD')
    const field = adviceSentences(
      {
        figures: advice,
        advice: { ...advice, expectedGenuineMinor: 1, expectedAftermarketMinor: null },
      } as never,
      'USD',
    )
    const even = 'Break-even: the aftermarket part pays until 38.7 of 100 fail.'
    const none = 'The shop has no failure figure for the aftermarket part.'
    expect(breakEvenWords(advice.breakEven)).toBe(even)
    expect(aftermarketWords(null)).toBe(none)
    expect(aftermarketWords(0.04)).toBe('Aftermarket fails 4 of 100.')
    expect(desk.first).toBe(`No failure figure, no advice. ${even}`)
    expect(desk.from).toContain(none)
    expect(field).toEqual([even, `${none} So there is no advice.`])
  })
})

describe('[R20] money has the decimals of its currency', () => {
  it.each([
    ['USD', 2, '135.00 USD'],
    ['JPY', 0, '13,500 JPY'],
    ['KWD', 3, '13.500 KWD'],
  ])('[R20] %s has %d', (currency, places, words) => {
    expect(currencyPlaces(currency)).toBe(places)
    expect(moneyWords(13_500, currency)).toBe(words)
  })
})
