import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook } from '@/lib/diag/book-index'
import { type CodeOnRecord, groupCodes } from '@/lib/diag/code-groups'

const index = indexBook({
  version: 1,
  hash: '',
  publishedAt: '2026-01-01T00:00:00.000Z',
  items: BOOK_ITEMS,
})
const spn = (
  number: number,
  fmi: number,
  status: CodeOnRecord['status'] = 'active',
): CodeOnRecord => ({ seen: { format: 'spn', spn: number, fmi }, status })
const pcode = (code: string): CodeOnRecord => ({
  seen: { format: 'pcode', code },
  status: 'active',
})
const groups = (...codes: CodeOnRecord[]) => groupCodes(index, codes)

describe('[R11] codes grouped by common cause', () => {
  it('[S5] SPN 168 FMI 1 with SPN 3509 FMI 4 stored: low supply comes first and does not convict the battery', () => {
    const battery = spn(168, 1)
    const rail = spn(3509, 4, 'stored')
    for (const order of [
      [battery, rail],
      [rail, battery],
    ]) {
      const [first, ...rest] = groups(...order)
      expect(rest).toEqual([])
      expect(first).toMatchObject({
        cause: 'lowSupply',
        leads: [battery],
        canBeSetByIt: [rail],
        activeNow: true,
      })
      expect(first?.why).toBe(
        'SPN 168 FMI 1 speaks of: low supply. That can set SPN 3509 FMI 4 as well, so it comes first.',
      )
      expect(first?.doesNotProve).toMatch(/^SPN 168 FMI 1 does not convict the battery/)
    }
  })
  it('[A5] the rail alone leads its sensors, by SPN and by P-code', () => {
    const [first, ...rest] = groups(spn(51, 4), spn(3509, 4), spn(102, 3), spn(1268, 5))
    expect(first).toMatchObject({ cause: 'sensorSupply', leads: [spn(3509, 4)] })
    expect(first?.canBeSetByIt).toEqual([spn(51, 4), spn(102, 3)])
    expect(rest.map((g) => [g.cause, g.name])).toEqual([
      ['circuit', 'Ignition coil 1, primary side'],
    ])
    expect(groups(pcode('P0642'), pcode('P0122'), pcode('P2122'))[0]).toMatchObject({
      cause: 'sensorSupply',
      canBeSetByIt: [pcode('P0122'), pcode('P2122')],
    })
  })
  it('[A5] a low supply takes the rail and the sensors on the rail with it', () => {
    const all = groups(spn(51, 4), pcode('P0562'), spn(620, 4))
    expect(all).toHaveLength(1)
    expect(all[0]).toMatchObject({ cause: 'lowSupply', leads: [pcode('P0562')] })
    expect(all[0]?.canBeSetByIt).toEqual([spn(51, 4), spn(620, 4)])
  })
  it('[A5] supply too high is no low supply', () => {
    expect(groups(spn(168, 0), spn(3509, 4)).map((g) => g.cause)).toEqual([
      'sensorSupply',
      'circuit',
    ])
    expect(groups(pcode('P0563'))[0]?.cause).toBe('circuit')
  })
  it('[A5] three circuits lifted at once and no supply code: a shared ground; two are not enough', () => {
    const three = groups(spn(51, 3), spn(102, 3), spn(110, 3))
    expect(three).toHaveLength(1)
    expect(three[0]).toMatchObject({ cause: 'ground', leads: [], activeNow: true })
    expect(three[0]?.canBeSetByIt).toHaveLength(3)
    expect(groups(spn(51, 3), spn(102, 3)).map((g) => g.cause)).toEqual(['circuit', 'circuit'])
    // Two codes of one circuit are one circuit.
    expect(groups(spn(51, 3), spn(51, 2), spn(102, 3)).map((g) => g.cause)).toEqual([
      'circuit',
      'circuit',
    ])
  })
  it('[A5] the network leads what others missed: U codes, SPN 639, kinds 9 and 19', () => {
    expect(groups(pcode('U0100'), spn(190, 9), spn(1268, 5)).map((g) => g.cause)).toEqual([
      'network',
      'circuit',
    ])
    expect(groups(spn(639, 2), spn(84, 19))[0]).toMatchObject({
      cause: 'network',
      canBeSetByIt: [spn(84, 19)],
    })
    expect(groups(pcode('U0100'), spn(168, 4)).map((g) => g.cause)).toEqual(['lowSupply'])
  })
  it('[A5] what the book does not know stays as shown, and nothing is said of it', () => {
    const odd: CodeOnRecord = { seen: { format: 'flash', pattern: '2-4' }, status: 'unknown' }
    expect(groups(odd)).toEqual([
      {
        cause: 'unread',
        name: 'Flash code 2-4',
        leads: [odd],
        canBeSetByIt: [],
        activeNow: false,
        lookFirst: null,
        why: 'The code book does not know it.',
        doesNotProve: null,
        source: 'as shown',
      },
    ])
    expect(groups()).toEqual([])
  })
  it('[A5] every code of a list stands in exactly one group, whatever the list', () => {
    const numbers = [...index.spns.keys()]
    const one = fc.oneof(
      fc
        .record({ n: fc.constantFrom(...numbers), fmi: fc.integer({ min: 0, max: 31 }) })
        .map((c) => spn(c.n, c.fmi)),
      fc.constantFrom(...index.pcodes.keys()).map(pcode),
    )
    fc.assert(
      fc.property(fc.array(one, { maxLength: 12 }), (codes) => {
        const placed = groups(...codes).flatMap((g) => [...g.leads, ...g.canBeSetByIt])
        expect(placed).toHaveLength(codes.length)
        expect(new Set(placed)).toEqual(new Set(codes))
      }),
      { seed: 41 },
    )
  })
})
