import { describe, expect, test } from 'vitest'
import { readMachine } from '@/components/field/settings/machine-screen'
import { settingWords } from '@/components/field/settings/setting-words'
import { placeAt } from '../support/field-sets'
import { machineOf } from '../support/shop-fixture'

const MACHINE = { ...machineOf('01980000-0000-7000-8000-000000000301'), hours: 412.5, year: 2021 }

describe('changing a machine in the field', () => {
  test('[M1] each value that changed is an op of its own; what did not change is none', () => {
    const ops = readMachine(MACHINE, { hours: '413', serial: ' AB 12 ', year: '2021' })
    expect(ops).toEqual([
      { kind: 'machine.set', machineId: MACHINE.id, fields: { field: 'hours', value: 413 } },
      { kind: 'machine.set', machineId: MACHINE.id, fields: { field: 'serial', value: 'AB 12' } },
    ])
  })

  test('[M1] what is cleared is set to nothing', () => {
    expect(readMachine(MACHINE, { hours: '' })).toEqual([
      { kind: 'machine.set', machineId: MACHINE.id, fields: { field: 'hours', value: null } },
    ])
  })

  test.each([
    [{ hours: 'many' }, 'Engine hours'],
    [{ hours: '-3' }, 'Engine hours'],
    [{ year: '1890' }, 'Year'],
    [{ unitNumber: 'x'.repeat(21) }, 'unit number'],
  ])('[M1] says what cannot be read: %o', (draft, words) => {
    expect(readMachine(MACHINE, draft)).toEqual({
      field: Object.keys(draft)[0],
      words: expect.stringContaining(words),
    })
  })
})

describe('a value in words', () => {
  test('[M4] says where a place comes from, and what was left empty', () => {
    expect(settingWords({ field: 'place', value: placeAt(47.1, 'By the gate') })).toMatch(
      /47\.1.*typed, By the gate/,
    )
    const fix = { ...placeAt(47.1), source: 'fix' as const, accuracyMetres: 11.6 }
    expect(settingWords({ field: 'place', value: fix })).toContain('position fix good to 12 m')
    expect(settingWords({ field: 'airTempC', value: -15 })).toBe('−15 °C')
    expect(settingWords({ field: 'weather', value: null })).toBe('nothing')
  })
})
