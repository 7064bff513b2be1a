import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PCODES } from '@/db/codebook/pcodes'
import { areaOf, isMakerSpn, LETTER_SYSTEMS, suffixKind } from '@/lib/diag/code-areas'
import { definedBy, encodeDtc, parsePcode } from '@/lib/diag/codes'
import { faultMessages, framesFromText, identifierOf } from '@/lib/diag/dm-frames'
import { theValue } from './the-value'

const code = (text: string) => theValue(parsePcode(text))
const messages = (text: string) => faultMessages(theValue(framesFromText(text)))

describe('SAE J2012 / ISO 15031-6, letters and digits', () => {
  it.each([
    ['P', 'powertrain'],
    ['C', 'chassis'],
    ['B', 'body'],
    ['U', 'network'],
  ] as const)('[STD] letter %s is the %s', (letter, system) => {
    expect(LETTER_SYSTEMS[letter]).toBe(system)
  })
  it.each([
    ['P0001', 'standard'],
    ['P1FFF', 'maker'],
    ['P2000', 'standard'],
    ['P3000', 'maker'],
    ['P33FF', 'maker'],
    ['P3400', 'standard'],
    ['P3FFF', 'standard'],
    ...['C', 'B', 'U'].flatMap((l) => [
      [`${l}0123`, 'standard'],
      [`${l}1123`, 'maker'],
      [`${l}2123`, 'maker'],
      [`${l}3123`, 'standard'],
    ]),
  ] as [string, string][])('[STD] %s is the %s word (P3, C, B and U from memory)', (text, who) => {
    expect(definedBy(code(text))).toBe(who)
  })
  it.each([
    ['P0087', 'fuelAndAir'],
    ['P0123', 'fuelAndAir'],
    ['P0201', 'fuelAndAir'],
    ['P0351', 'ignition'],
    ['P0443', 'auxiliaryEmission'],
    ['P0505', 'speedIdleInputs'],
    ['P0641', 'computerOutputs'],
    ['P0705', 'transmission'],
    ['P0850', 'transmission'],
    ['P0900', 'transmission'],
    ['P0A0F', 'hybrid'],
    ['P0C00', 'hybrid'],
    ['P0D00', null],
    ['P1351', null],
    ['C0351', null],
  ] as const)('[STD] second digit of %s: %s (seen in secondary text)', (text, area) => {
    expect(areaOf(code(text))).toBe(area)
  })
  it.each([
    ['P0105', 'circuit'],
    ['P0121', 'range'],
    ['P0222', 'low'],
    ['P0463', 'high'],
    ['P0124', 'intermittent'],
    ['P0502', 'low'],
    ['P0503', 'intermittent'],
    ['P0335', 'circuit'],
    ['P0336', 'range'],
    ['P0337', 'low'],
    ['P0338', 'high'],
    ['P0339', 'intermittent'],
    ['P0131', null],
    ['P0201', null],
    ['P0351', null],
    ['P0301', null],
    ['P0125', null],
    ['P00A5', null],
  ] as const)('[STD] last digit of %s: %s (CHECKS 1.6, suffix family)', (text, kind) => {
    expect(suffixKind(code(text))).toBe(kind)
  })
  it('[STD] every code of our table in these groups has the kind its last digit names', () => {
    const inGroups = PCODES.flatMap(({ code: text, failure }) => {
      const kind = suffixKind(code(text))
      return kind === null ? [] : [[text, failure, kind]]
    })
    expect(inGroups.length).toBeGreaterThan(30)
    for (const [text, failure, kind] of inGroups) expect([text, failure]).toEqual([text, kind])
  })
  it('[STD] our table is not the shifted open set: P0301 is cylinder 1, P0351 coil A, P0562 low volts (CHECKS 1.6 trap)', () => {
    const name = (text: string) => PCODES.find((p) => p.code === text)?.name
    expect(name('P0300')).toMatch(/random/)
    expect(name('P0301')).toMatch(/cylinder 1/)
    expect(name('P0351')).toMatch(/coil A/)
    expect(name('P0562')).toMatch(/voltage low/)
  })
  it.each([
    [516_095, false],
    [516_096, true],
    [520_192, true],
    [524_287, true],
    [524_288, false],
  ])('[STD] SPN %i in the maker range: %s (SAE J1939; below 520192 from memory)', (spn, maker) => {
    expect(isMakerSpn(spn)).toBe(maker)
  })
})

describe('SAE J1939-21 and -73, fault messages from frames', () => {
  it('[STD] 18FECAAA is DM1 (PGN 65226) from address AA at priority 6; FECB is DM2 (65227)', () => {
    const all = 255
    expect(identifierOf(0x18fecaaa)).toEqual({ priority: 6, pgn: 65_226, sender: 0xaa, to: all })
    expect(identifierOf(0x18fecb00)).toEqual({ priority: 6, pgn: 65_227, sender: 0, to: all })
    // Below 240 the low byte is an address and no part of the group.
    expect(identifierOf(0x18ecff03)).toEqual({ priority: 6, pgn: 60_416, sender: 3, to: all })
    expect(identifierOf(0x1cebf903)).toEqual({ priority: 7, pgn: 60_160, sender: 3, to: 0xf9 })
    expect(identifierOf(0x1dfecaaa)).toMatchObject({ priority: 7, pgn: 0x1_fe_ca })
  })
  it('[STD] 18FECAAA 00 FF D2 04 1F 01 FF FF: SPN 1234 FMI 31 count 1 from AA (C++ stack test, seen)', () => {
    const [message] = theValue(messages('18FECAAA#00FFD2041F01FFFF'))
    expect(message).toMatchObject({ kind: 'active', sender: 0xaa })
    expect(message?.message.codes).toEqual([{ spn: 1234, fmi: 31, count: 1, version: 4 }])
  })
  it('[R11] logs with a bus name and a length read alike; other traffic is passed over', () => {
    const log =
      'can0  0CF00400   [8]  FF FF FF 00 00 FF FF FF\n\ncan0  18FECB00   [8]  00 FF F4 04 05 01 FF FF\n'
    expect(theValue(messages(log))).toMatchObject([
      { kind: 'earlier', sender: 0, message: { codes: [{ spn: 1268, fmi: 5, count: 1 }] } },
    ])
  })
  it('[STD] three codes in 14 bytes come by announcement and two packets (J1939-21, memory)', () => {
    const log = [
      '18ECFF00 20 0E 00 02 FF CA FE 00',
      '18EBFF00 01 04 FF D2 04 1F 01 F4',
      '18EBFF00 02 04 05 01 B8 04 03 0A',
    ]
    const [message] = theValue(messages(log.join('\n')))
    expect(message?.message.codes.map((c) => c.spn)).toEqual([1234, 1268, 1208])
    expect(messages([log[0], log[2]].join('\n'))).toMatchObject({
      ok: false,
      problem: { kind: 'packetMissing', frame: 2, packet: 1 },
    })
    expect(messages([log[0], log[1]].join('\n'))).toMatchObject({
      problem: { kind: 'unfinished', sender: 0 },
    })
  })
  it('[STD] earlier codes asked for by one address come to it alone, beside those to all (J1939-21, memory)', () => {
    const log = [
      '18ECFF00 20 0E 00 02 FF CA FE 00',
      '18ECF900 10 0A 00 02 FF CB FE 00',
      '18EBF900 01 04 FF D2 04 1F 01 F4',
      '18EBFF00 01 04 FF D2 04 1F 01 F4',
      // The asker's own answer, and a group that is not about faults.
      '18EC00F9 11 02 01 FF FF CB FE 00',
      '18ECFF07 20 0E 00 02 FF 00 EF 00',
      '18EBF900 02 04 05 01 FF FF FF FF',
      '18EBFF00 02 04 05 01 B8 04 03 0A',
    ]
    const got = theValue(messages(log.join('\n')))
    expect(got.map(({ kind, message }) => [kind, message.codes.map((c) => c.spn)])).toEqual([
      ['earlier', [1234, 1268]],
      ['active', [1234, 1268, 1208]],
    ])
  })
  it('[R11] no half list: a second announcement, a short packet and a wrong count of packets are refused', () => {
    const start = '18ECFF00 20 0E 00 02 FF CA FE 00'
    const first = '18EBFF00 01 04 FF D2 04 1F 01 F4'
    const wrong = (frame: number, got: number) => ({
      ok: false,
      problem: { kind: 'badMessage', frame, problem: { kind: 'wrongLength', got } },
    })
    expect(messages([start, first, start].join('\n'))).toMatchObject({
      problem: { kind: 'unfinished', sender: 0 },
    })
    expect(messages([start, '18EBFF00 01 04 FF D2 04 1F 01'].join('\n'))).toMatchObject(wrong(2, 6))
    expect(messages([start, first, '18EBFF00 02 04 05 01'].join('\n'))).toMatchObject(wrong(3, 3))
    expect(messages('18ECFF00 20 0E 00 01 FF CA FE 00')).toMatchObject(wrong(1, 14))
    expect(messages('18ECFF00 20 08 00 02 FF CA FE 00')).toMatchObject(wrong(1, 8))
    expect(messages('18ECFF00 20 00 07 00 FF CA FE 00')).toMatchObject(wrong(1, 1792))
  })
  it('[R11] a line that is no frame is named by its number, as is a message that cannot be', () => {
    expect(framesFromText('18FECAAA 00 FF\nhello')).toMatchObject({ problem: { frame: 2 } })
    expect(framesFromText('18FECAAA 0')).toMatchObject({ problem: { kind: 'notFrame' } })
    expect(messages('18FECAAA 00 FF')).toMatchObject({
      problem: { kind: 'badMessage', frame: 1, problem: { kind: 'wrongLength' } },
    })
  })
  it('[R11] any number of codes from several senders at once comes out as it went in', () => {
    const dtc = fc.record({
      spn: fc.integer({ min: 1, max: 524_286 }),
      fmi: fc.integer({ min: 0, max: 30 }),
      count: fc.integer({ min: 1, max: 126 }),
      version: fc.constant(4 as const),
    })
    const lists = fc.array(fc.array(dtc, { minLength: 2, maxLength: 9 }), {
      minLength: 1,
      maxLength: 4,
    })
    fc.assert(
      fc.property(lists, (sent) => {
        const lines = sent.map((codes, sender) => {
          const bytes = [4, 255, ...codes.flatMap((c) => theValue(encodeDtc(c)))]
          const packets = Math.ceil(bytes.length / 7)
          const hex = (list: number[]) => list.map((b) => b.toString(16).padStart(2, '0')).join(' ')
          const id = (pgn: string) => `18${pgn}FF${sender.toString(16).padStart(2, '0')}`
          return [
            `${id('EC')} ${hex([32, bytes.length, 0, packets, 255, 0xca, 0xfe, 0])}`,
            ...Array.from({ length: packets }, (_, p) => {
              const data = bytes.slice(7 * p, 7 * p + 7)
              return `${id('EB')} ${hex([p + 1, ...data, ...Array(7 - data.length).fill(255)])}`
            }),
          ]
        })
        // Packets of the senders by turns, each sender's own in order.
        const longest = Math.max(...lines.map((l) => l.length))
        const mixed = Array.from({ length: longest }, (_, i) =>
          lines.flatMap((l) => l[i] ?? []),
        ).flat()
        const got = theValue(messages(mixed.join('\n')))
        const byCame = got.toSorted((a, b) => a.sender - b.sender)
        expect(byCame.map((m) => m.message.codes)).toEqual(sent)
      }),
      { seed: 42, numRuns: 60 },
    )
  })
})
