import { describe, expect, it } from 'vitest'
import { saysNothingOf, twinOf } from '@/lib/diag/good-twin'
import type { LogEntry } from '@/lib/model/log-entry'
import { entry } from '../field/checks-log'

describe('a good twin', () => {
  const reading = (subject: 'suspect' | 'knownGood', asTyped: string): LogEntry =>
    entry({
      kind: 'reading',
      checkId: 'coilPrimaryResistance',
      quantity: 'resistance',
      value: Number(asTyped),
      unit: 'ohm',
      asTyped,
      overRange: false,
      subject,
      meterId: '01980000-0000-7000-8000-000000000401',
      meterName: 'Pocket meter (demo)',
      meterFunction: { percent: 0.8, digits: 3, resolution: 0.1 },
      leadsOhm: { low: 0.3, high: 0.6 },
      nulled: false,
      partTempC: 20,
      meterTempC: 20,
      perKelvin: 0.1,
      spec: null,
      result: null,
    })

  it('[R17] is only there when both were read, and takes the last of each', () => {
    const a = reading('suspect', '1.0')
    const b = reading('suspect', '1.1')
    const good = reading('knownGood', '1.0')
    expect(twinOf('coilPrimaryResistance', [a, b])).toBeNull()
    expect(twinOf('coilPrimaryResistance', [a, b, good])?.suspect.id).toBe(b.id)
  })

  it('[F4] says nothing only when no suspect was moved by the reading', () => {
    const why = (logRatio: number) => [{ why: [{ entryId: 'x', saysNothing: false, logRatio }] }]
    expect(saysNothingOf(why(0), 'x')).toBe(true)
    expect(saysNothingOf(why(-0.4), 'x')).toBe(false)
  })
})
