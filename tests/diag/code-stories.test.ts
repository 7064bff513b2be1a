import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import { explainCode } from '@/lib/diag/code-words'
import type { CodeBookItem } from '@/lib/model/code-book'
import type { CodeContext, CodeSeen } from '@/lib/model/code-seen'
import type { LogBody } from '@/lib/model/log-entry'
import { caseOf, code, fixed, log } from './fixtures/entries'
import { SMALL_ITEMS } from './fixtures/small-book'

/** The small book with a story that two SPNs and a P-code tell: of 100 with the filter, 40 set it. */
const STORY = { id: 'weakFlow', of100: { filter: 40, coil: 10 }, otherwise: 2 }
const spnItem = (spn: number, fmis: number[] | null, circuit: string | null): CodeBookItem => ({
  kind: 'spn',
  id: `spn${spn}`,
  spn,
  name: `condition ${spn}`,
  circuit,
  tells: { ...STORY, fmis },
  group: 'fuel',
  confidence: 'high',
  makersDiffer: false,
  source: 'invented for tests',
})
const index = indexBook({
  version: 1,
  hash: '',
  publishedAt: '',
  items: [
    ...SMALL_ITEMS,
    spnItem(1322, null, null),
    spnItem(94, [1, 17], null),
    spnItem(95, null, 'coilCircuit'),
    {
      kind: 'pcode',
      id: 'P0087',
      code: 'P0087',
      name: 'too little pressure',
      circuit: null,
      failure: 'circuit',
      tells: { ...STORY, fmis: null },
      group: 'fuel',
      makersDiffer: false,
      source: 'invented for tests',
    },
  ],
})
const seen = (text: string, status: CodeContext['status'] = 'active'): LogBody => ({
  kind: 'code',
  seen: { format: 'pcode', code: text },
  context: { module: 0, status, count: null, order: 1, photo: null },
})
const run = (...bodies: LogBody[]) => belief(caseOf(log(...bodies), { index }))
const of = (...bodies: LogBody[]): Record<string, number> =>
  Object.fromEntries(run(...bodies).suspects.map((s) => [s.fault, s.chance]))
const labels = (...bodies: LogBody[]) => run(...bodies).suspects[0]?.why.map((w) => w.label) ?? []

describe('[CB22] a code that tells of a condition', () => {
  it('[CB22] lifts its faults by their figures, and without a circuit', () => {
    const [before, after] = [of(), of(code(1322, 31))]
    expect(after.filter).toBeGreaterThan(before.filter!)
    expect(after.filter! / before.filter!).toBeGreaterThan(after.coil! / before.coil!)
    expect(after.wire).toBeLessThan(before.wire!)
  })
  it('[CB22] with one fault only the odds move by the ratio of the figures, never by more', () => {
    const odds = (p: number) => p / (1 - p)
    const ratio = odds(of(code(1322, 31)).filter!) / odds(of().filter!)
    expect(ratio).toBeGreaterThan(1.5)
    expect(ratio).toBeLessThanOrEqual(40 / 2)
  })
  it('[CB22] an SPN tells it under the kinds named, and under no other', () => {
    expect(of(code(94, 17)).filter).toBeGreaterThan(of().filter!)
    expect(of(code(94, 3))).toEqual(of())
  })
  it('[CB22] told twice it counts once, whatever tells it and in whatever order', () => {
    const once = of(code(1322, 31))
    expect(of(code(1322, 31), seen('P0087'))).toEqual(once)
    expect(of(seen('P0087'), code(1322, 31), code(94, 1))).toEqual(once)
    expect(labels(code(1322, 31), seen('P0087'))).toContain(
      'P0087: too little pressure (another code tells the same)',
    )
  })
  it('[CB22] the active one speaks for a stored one before it', () => {
    expect(of(code(94, 1, 'stored'), seen('P0087'))).toEqual(of(seen('P0087')))
    expect(of(code(94, 1, 'stored')).filter).toBeLessThan(of(seen('P0087')).filter!)
  })
  it('[CB22] in a circuit its own figure comes before that of the kind, and the others keep theirs', () => {
    const after = of(code(95, 5))
    // Coil as a part would set kind 5 in 10 of 100, wiring in 40; the story says 10 for the coil, 40 for the filter.
    expect(after.wire).toBeGreaterThan(of().wire!)
    expect(after.filter).toBeGreaterThan(of().filter!)
  })
  it('[E4] after a fix of what it tells of, active it is another code, stored it may be the old one', () => {
    const start = seen('P0087')
    const again = of(start, fixed('filter'), seen('P0087'))
    expect(again.filter).toBeLessThan(of(start, seen('P0087')).filter!)
    expect(of(start, fixed('filter'), seen('P0087', 'stored'))).toEqual(of(start, fixed('filter')))
  })
})

describe('[R11] what a number says by its form, and what its kind leaves open', () => {
  const book = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
  const words = (text: string) => explainCode(book, { format: 'pcode', code: text })
  const pair = (spn: number, fmi: number) => explainCode(book, { format: 'spn', spn, fmi })

  it.each(['P1351', 'P3000', 'C1200', 'B2100', 'U1000'])(
    '[R11] %s is a maker’s own: nothing is said of its meaning',
    (text) => {
      expect(words(text)).toMatchObject({ circuit: null, makersDiffer: true, unknown: true })
      expect(words(text).formWords).toMatch(/each maker's own/)
    },
  )
  it('[R11] a standard code that is not held is put to its area, and half decoded by its last digit', () => {
    expect(words('P0391').formWords).toMatch(/does not hold.*ignition/)
    expect(words('P0332').failure?.id).toBe('low')
    expect(words('P0394').failure?.id).toBe('intermittent')
    expect(words('P0375').failure).toBeNull()
    expect(words('P0465').formWords).toMatch(/exhaust and fuel vapour/)
    expect(words('P0117').formWords).toBeNull()
  })
  it('[R11] an SPN of the maker’s range keeps its kind alone', () => {
    for (const spn of [516_096, 520_200, 524_287]) {
      const said = pair(spn, 4)
      expect(said).toMatchObject({ circuit: null, failure: { id: 'fmi4' }, makersDiffer: true })
      expect(said.formWords).toMatch(/each maker's own/)
      expect(said.kindSupports).toEqual([])
    }
    expect(pair(516_095, 4).formWords).toBeNull()
  })
  it('[R11] every pair of any SPN with any kind says what it does not prove', () => {
    for (let fmi = 0; fmi < 32; fmi += 1)
      for (const spn of [1268, 77, 520_300]) {
        const said = pair(spn, fmi)
        expect(said.kindDoesNotProve, `${spn}/${fmi}`).toMatch(/^It (does not|says nothing)/)
        expect(said.doesNotProve.length).toBeGreaterThan(20)
      }
  })
  it('[R11] every P-code of the book says it, too', () => {
    for (const text of book.pcodes.keys())
      expect(words(text).kindDoesNotProve, text).toMatch(/^It (does not|tells what was seen)/)
  })
  it('[CB22] a misfire names the plug among what it supports, with its figure', () => {
    const plug = words('P0301').kindSupports.find((f) => f.fault === 'sparkPlugBad')
    expect(plug).toMatchObject({ role: null, of100: 35 })
  })
  it('[R11] a blink pattern and what stands there in words move nothing and mean nothing', () => {
    const shown: CodeSeen[] = [
      { format: 'flash', pattern: '2-4' },
      { format: 'asShown', text: 'E-17' },
    ]
    for (const one of shown)
      expect(explainCode(book, one)).toMatchObject({
        failure: null,
        circuit: null,
        kindSupports: [],
        formWords: null,
        unknown: true,
      })
  })
})
