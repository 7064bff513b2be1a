import { describe, expect, it } from 'vitest'
import { figureOf, pressed } from '@/components/checks/keypad-text'
import { readDegrees } from '@/components/checks/meter-setup-form'
import { movedBetween, whyLine } from '@/components/checks/why-words'
import { minutesWords, onScreen } from '@/components/checks/words'
import { minutesUntil } from '@/components/engine/leave-by'
import { unitLabel } from '@/components/reading-strip/unit-words'
import { marksOf, saysNothing } from '@/components/suspects/outlook-words'
import { moneyWords } from '@/lib/shop/currency'

describe('the keypad', () => {
  const typed = (...keys: string[]) => keys.reduce((text, key) => pressed(text, key as never), '')

  it('[R8] keeps what was typed to the keystroke, half figures included', () => {
    expect(typed('2', '7', '.')).toBe('27.')
    expect(figureOf('27.')).toBe(27)
  })

  it.each([
    [['.', '5'], '0.5'],
    [['0', '5'], '5'],
    [['1', '.', '.', '0'], '1.0'],
    [['1', '2', 'back'], '1'],
    [['1', 'sign'], '-1'],
    [['1', 'sign', 'sign'], '1'],
    [['sign', '5', 'back'], ''],
    [['1', '2', '3', '4', '5', '6', '7', '8', '9', '1'], '123456789'],
  ])('after %j stands %s', (keys, text) => {
    expect(typed(...keys)).toBe(text)
  })

  it('has no figure while there is only a sign or nothing', () => {
    expect([figureOf(''), figureOf('-'), figureOf('0')]).toEqual([null, null, 0])
  })
})

describe('units on the keypad', () => {
  it('[F4] tells direct and alternating volts apart, and shows degrees with their sign', () => {
    expect(unitLabel('dcVoltage', 'mV')).toBe('mV DC')
    expect(unitLabel('acVoltage', 'mV')).toBe('mV AC')
    expect([unitLabel('temperature', 'degF'), unitLabel('resistance', 'kohm')]).toEqual([
      '°F',
      'kohm',
    ])
  })
})

describe('times and money in words', () => {
  it('[R6] leave-by counts in minutes of the job, negative once it is past', () => {
    const now = Date.parse('2026-11-24T18:20:30.000Z')
    expect(minutesUntil('16:33', 'Etc/GMT+6', now)).toBe(253)
    expect(minutesUntil('12:00', 'Etc/GMT+6', now)).toBe(-20)
  })

  it('shows money with its code and its own decimals', () => {
    expect(moneyWords(13500, 'USD')).toBe('135.00 USD')
    expect(moneyWords(1234567, 'USD')).toBe('12,345.67 USD')
    expect(moneyWords(500, 'JPY')).toBe('500 JPY')
    expect(moneyWords(-150, 'USD')).toBe('−1.50 USD')
  })

  it.each([
    [0.5, 'under 1 min'],
    [4, '4 min'],
    [89, '89 min'],
    [125, '2 h 05'],
  ])('%s minutes are %s', (minutes, words) => {
    expect(minutesWords(minutes)).toBe(words)
  })

  it('puts the signs of the screen into plain words', () => {
    expect(onScreen('it reads +-0.395 ohm at 20 C, -15 C outside')).toBe(
      'it reads ±0.395 ohm at 20 °C, −15 °C outside',
    )
    expect(onScreen('C-rated and P-code stay')).toBe('C-rated and P-code stay')
  })

  it('[R7] reads temperatures as people type them and refuses the rest', () => {
    expect(['-15', '−15', '20,5', '20', '300', 'warm', ''].map(readDegrees)).toEqual([
      -15,
      -15,
      20.5,
      20,
      null,
      null,
      null,
    ])
  })
})

describe('why a suspect stands where it stands', () => {
  it.each([
    [Math.log(14), false, 'speaks strongly towards it', '14 times'],
    [-Math.log(1.1), false, 'speaks hardly against it', '1.1 times'],
    [-Math.log(1.5), false, 'speaks a little against it', '1.5 times'],
    [Math.log(2000), false, 'speaks very strongly towards it', 'over 1,000 times'],
    [0, false, 'says nothing about it', ''],
    [2, true, 'says nothing about it', ''],
  ])('[R5] a log ratio of %s is said as such', (logRatio, silent, strength, factor) => {
    const line = whyLine({ logRatio, saysNothing: silent })
    expect([line.strength, line.factor]).toEqual([strength, factor])
  })

  it('[F4] a reading that moves no suspect by 3 of 100 barely moves them', () => {
    const list = (coil: number, wire: number) =>
      [
        { fault: 'coil', name: 'Coil', chance: coil },
        { fault: 'wire', name: 'Wire', chance: wire },
      ] as never
    expect(movedBetween(list(0.52, 0.15), list(0.54, 0.14)).barely).toBe(true)
    const moved = movedBetween(list(0.54, 0.14), list(0.85, 0.1))
    expect(moved.barely).toBe(false)
    expect(moved.rows[0]).toMatchObject({ fault: 'coil', before: 0.54, after: 0.85 })
  })
})

describe('marks over a suspect', () => {
  const outlook = (good: number, bad: number) => [
    { outcome: 'good', name: 'Sound', good: true, probability: 0.5, chances: { coil: good } },
    { outcome: 'bad', name: 'Burnt', good: false, probability: 0.5, chances: { coil: bad } },
  ]

  it('[R5] two outcomes are "if good" with a ring and "if bad" with a cross', () => {
    expect(marksOf('coil', outlook(0.07, 0.87)).map(({ words, shape }) => [words, shape])).toEqual([
      ['if good', 'ring'],
      ['if bad', 'cross'],
    ])
  })

  it('[R5] more outcomes keep their own names and each its own sign', () => {
    const three = [
      ...outlook(0.1, 0.3),
      { outcome: 'open', name: 'Open', good: false, probability: 0.1, chances: { coil: 0.9 } },
    ]
    const marks = marksOf('coil', three)
    expect(marks.map((mark) => mark.words)).toEqual(['Sound', 'Burnt', 'Open'])
    expect(new Set(marks.map((mark) => mark.shape)).size).toBe(3)
  })

  it('[R5] marks under 3 apart say nothing, 3 apart say something', () => {
    expect(saysNothing(marksOf('coil', outlook(0.4, 0.429)))).toBe(true)
    expect(saysNothing(marksOf('coil', outlook(0.4, 0.4301)))).toBe(false)
    expect(saysNothing([])).toBe(false)
  })
})
