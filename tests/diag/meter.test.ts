import { describe, expect, it } from 'vitest'
import { meterAtHand, meterInput } from '@/lib/diag/meter'
import { METER } from '@/scripts/demo-shop'

const other = { ...METER, id: '01980000-0000-7000-8000-000000000499', name: 'Second meter (demo)' }
const stands = { nulled: true, partTempC: 20, meterTempC: -5 }

describe('the meter in hand', () => {
  it('[R7] brings its accuracy, leads, temperatures and the figure into the reading', () => {
    expect(meterInput(METER, stands, { quantity: 'resistance', spec: null })).toEqual({
      quantity: 'resistance',
      meterFunction: METER.functions.resistance,
      leadsOhm: METER.leadsOhm,
      nulled: true,
      partTempC: 20,
      meterTempC: -5,
      perKelvin: METER.perKelvin,
      spec: null,
    })
  })

  it('[F4] reads nothing it has no function for, and nothing without a meter', () => {
    expect(METER.functions.pressure).toBeUndefined()
    expect(meterInput(METER, stands, { quantity: 'pressure', spec: null })).toBeNull()
    expect(meterInput(null, stands, { quantity: 'resistance', spec: null })).toBeNull()
  })

  it('[F4] is the first of the bag that the shop still has', () => {
    const bag = { meterIds: ['01980000-0000-7000-8000-000000000498', other.id, METER.id] }
    expect(meterAtHand([METER, other], bag)).toBe(other)
  })

  it('[F4] without one in the bag it is the only one of the shop, and none of several', () => {
    expect(meterAtHand([METER], null)).toBe(METER)
    expect(meterAtHand([METER], { meterIds: [] })).toBe(METER)
    expect(meterAtHand([METER, other], undefined)).toBeNull()
    expect(meterAtHand(undefined, null)).toBeNull()
  })
})
