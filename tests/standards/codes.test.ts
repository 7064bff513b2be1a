import { describe, expect, it } from 'vitest'
import {
  bytesFromHex,
  type Dtc,
  decodeDtc,
  definedBy,
  encodeDtc,
  parsePcode,
  pcodeFromBytes,
  pcodeToBytes,
  printPcode,
  readDm1,
} from '@/lib/diag/codes'

const bytes = (hex: string): number[] => {
  const read = bytesFromHex(hex)
  if (!read.ok) throw new Error(hex)
  return read.value
}
const value = <T>(r: { ok: true; value: T } | { ok: false }): T => {
  if (!r.ok) throw new Error(JSON.stringify(r))
  return r.value
}

describe('bytes in hex', () => {
  it.each(['D2041F01', 'd2 04 1f 01', '0xD2, 0x04, 0x1F, 0x01', 'D2:04-1F 01', ' D204 1F01 '])(
    '[A8] %s are the same four bytes',
    (text) => expect(bytes(text)).toEqual([0xd2, 0x04, 0x1f, 0x01]),
  )
  it.each(['', ' ', 'D2 4 1F 1', '1 2', 'D204F', '0x', 'G0', '10x2'])(
    '[A8] "%s" is refused and not guessed',
    (text) => expect(bytesFromHex(text)).toMatchObject({ problem: { kind: 'notBytes' } }),
  )
})

/** Hex, version named or null, SPN, FMI, count, where the figures come from. */
const DTCS: [string, Dtc['version'] | null, number, number, number, string][] = [
  ['D2 04 1F 01', null, 1234, 31, 1, 'agricultural-bus C++ stack, unit test of DM1 (seen)'],
  ['B8 04 03 0A', null, 1208, 3, 10, 'SAE J1939-73 example (memory, recomputed)'],
  ['F4 04 05 01', null, 1268, 5, 1, 'SAE J1939-73 5.7.1 layout (recomputed)'],
  ['FF FF FF 7E', null, 524287, 31, 126, 'SAE J1939-73 5.7.1 maxima (recomputed)'],
  ['B8 04 03 8A', 3, 1208, 3, 10, 'bus-gateway manual table 6-3, version 3 (recomputed)'],
  ['97 00 03 8A', 2, 1208, 3, 10, 'generator-control manual appendix F, version 2 (recomputed)'],
  ['00 97 03 8A', 1, 1208, 3, 10, 'generator-control manual appendix F, version 1 (recomputed)'],
]

describe('SAE J1939-73 trouble codes in four bytes', () => {
  it.each(DTCS)(
    '[STD] %s as version %s is SPN %i FMI %i count %i: %s',
    (hex, version, spn, fmi, count) => {
      const dtc = value(decodeDtc(bytes(hex), version ?? undefined))
      expect(dtc).toEqual({ spn, fmi, count, version: version ?? 4 })
      expect(value(encodeDtc(dtc))).toEqual(bytes(hex))
    },
  )
  it('[STD] a cleared conversion bit is version 4, three sources against one manual (CHECKS 1.1 trap)', () => {
    expect(value(decodeDtc([0xd2, 0x04, 0x1f, 0x01])).version).toBe(4)
    expect(decodeDtc([0xd2, 0x04, 0x1f, 0x81])).toMatchObject({
      ok: false,
      problem: { kind: 'versionUnknown' },
    })
    expect(decodeDtc([0xd2, 0x04, 0x1f, 0x81], 4)).toMatchObject({
      problem: { kind: 'versionMismatch' },
    })
    expect(decodeDtc([0xd2, 0x04, 0x1f, 0x01], 2)).toMatchObject({
      problem: { kind: 'versionMismatch' },
    })
  })
  it('[A1] what no code holds is named, in both directions', () => {
    expect(decodeDtc([1, 2, 3])).toMatchObject({ problem: { kind: 'wrongLength', got: 3 } })
    for (const wrong of [256, -1, 1.5, Number.NaN])
      expect(decodeDtc([1, 2, 3, wrong])).toMatchObject({ problem: { kind: 'notBytes' } })
    const dtc: Dtc = { spn: 1, fmi: 1, count: 1, version: 4 }
    const field = (over: Partial<Dtc>) => encodeDtc({ ...dtc, ...over })
    expect(field({ spn: 524_288 })).toMatchObject({ problem: { field: 'spn' } })
    expect(field({ fmi: 32 })).toMatchObject({ problem: { field: 'fmi' } })
    expect(field({ count: 127 })).toMatchObject({ problem: { field: 'count' } })
    expect(field({ spn: Number.NaN })).toMatchObject({ problem: { field: 'spn' } })
  })
  it('[STD] a count of 127 is "not available", in both directions (SAE J1939-73)', () => {
    const dtc = value(decodeDtc([0xf4, 0x04, 0x05, 0x7f]))
    expect(dtc.count).toBeNull()
    expect(value(encodeDtc(dtc))).toEqual([0xf4, 0x04, 0x05, 0x7f])
  })
})

describe('SAE J1939-73 DM1', () => {
  const off = { state: 'off', flash: 'steady' }
  it('[STD] 00 FF D2 04 1F 01 FF FF: lamps off, one code, padding (C++ stack test, seen)', () => {
    const dm1 = value(readDm1(bytes('00 FF D2 04 1F 01 FF FF')))
    expect(dm1.lamps).toEqual({ malfunction: off, stop: off, warning: off, protect: off })
    expect(dm1.codes).toEqual([{ spn: 1234, fmi: 31, count: 1, version: 4 }])
  })
  it('[STD] FF FF D2 04 1F 01 FF FF: lamp bytes not used (agricultural mode, seen)', () => {
    const dm1 = value(readDm1(bytes('FF FF D2 04 1F 01 FF FF')))
    expect(dm1.lampsUsed).toBe(false)
    expect(dm1.codes).toHaveLength(1)
  })
  it('[STD] FF FF 00 00 00 00 FF FF: no active fault, not SPN 0 (seen)', () => {
    expect(value(readDm1(bytes('FF FF 00 00 00 00 FF FF'))).codes).toEqual([])
  })
  it('[STD] 44 FF F4 04 05 01 FF FF: malfunction and amber on, solid; 1268/5/1 (recomputed)', () => {
    const dm1 = value(readDm1(bytes('44 FF F4 04 05 01 FF FF')))
    expect(dm1.lamps.malfunction).toEqual({ state: 'on', flash: 'steady' })
    expect(dm1.lamps.warning).toEqual({ state: 'on', flash: 'steady' })
    expect(dm1.lamps.stop.state).toBe('off')
    expect(dm1.codes).toEqual([{ spn: 1268, fmi: 5, count: 1, version: 4 }])
  })
  it('[STD] flash 00 is slow and 01 fast (1 Hz and 2 Hz from memory)', () => {
    const dm1 = value(readDm1(bytes('50 1F F4 04 05 01 FF FF')))
    expect(dm1.lamps.malfunction).toEqual({ state: 'on', flash: 'slow' })
    expect(dm1.lamps.stop).toEqual({ state: 'on', flash: 'fast' })
  })
  it('[STD] a message put together from packets holds four bytes per code after the lamps', () => {
    const dm1 = value(readDm1(bytes('04 FF D2 04 1F 01 F4 04 05 01 B8 04 03 0A')))
    expect(dm1.codes.map((d) => d.spn)).toEqual([1234, 1268, 1208])
  })
  it('[STD] a torn message is refused with its length', () => {
    expect(readDm1([0, 255, 1, 2, 3, 4, 5])).toMatchObject({
      ok: false,
      problem: { kind: 'wrongLength', got: 7 },
    })
    expect(readDm1([0, 255, 300, 2, 3, 4])).toMatchObject({ problem: { kind: 'notBytes' } })
    expect(readDm1([0, 255])).toMatchObject({ problem: { kind: 'wrongLength' } })
  })
})

/** Code, two bytes: SAE J2012 / ISO 15031-6, recomputed, layout from memory. */
const PCODES: [string, number, number][] = [
  ['P0123', 0x01, 0x23],
  ['P0351', 0x03, 0x51],
  ['P00A5', 0x00, 0xa5],
  ['C0123', 0x41, 0x23],
  ['B1A00', 0x9a, 0x00],
  ['U0100', 0xc1, 0x00],
  ['P3FFF', 0x3f, 0xff],
  ['U3FFF', 0xff, 0xff],
]
describe('SAE J2012 / ISO 15031-6 two-byte codes', () => {
  it.each(PCODES)('[STD] %s is bytes %i %i and back', (code, high, low) => {
    expect(printPcode(value(pcodeFromBytes(high, low)))).toBe(code)
    expect(pcodeToBytes(value(parsePcode(code)))).toEqual([high, low])
  })
  it('[STD] 00 00 is padding, no code', () => {
    expect(pcodeFromBytes(0, 0)).toMatchObject({ ok: false, problem: { kind: 'noCode' } })
  })
  it.each([
    ['P0300', 'standard'],
    ['P1300', 'maker'],
    ['P2300', 'standard'],
    ['P33FF', 'maker'],
    ['P3400', 'standard'],
    ['C1000', 'maker'],
    ['U0100', 'standard'],
  ])('[STD] %s is defined by the %s (P3, C, B and U digits from memory)', (code, who) => {
    expect(definedBy(value(parsePcode(code)))).toBe(who)
  })
  it.each(['P4000', 'X0123', 'P012', 'P01234', 'P0G00', ''])('[STD] %s is not a code', (text) => {
    expect(parsePcode(text)).toMatchObject({ ok: false, problem: { kind: 'notPcode' } })
  })
})
