import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judgeRig, judgeTow, type Link, linePull } from '@/lib/diag/rigging'
import { PULL_CAUTIONS, rigSentences } from '@/lib/diag/rigging-words'
import { GROUNDS, type Ground, LOCKED, pullOf, type Stuck, towOf } from '@/lib/diag/winch-pull'
import { theValue } from './the-value'

const stuck = (over: Partial<Stuck> = {}): Stuck => ({
  massKg: 800,
  slopeDegrees: 20,
  ground: 'lightMud',
  locked: 'none',
  ...over,
})

describe('pull of a stuck machine (recovery sheet, seen; CHECKS 2.10)', () => {
  it('[STD] 800 kg, 20 degrees, mud 0.33: 5116.08 N, of it gravity 2683.26', () => {
    const pull = theValue(pullOf(stuck()))
    expect(pull.pullNewtons).toBeCloseTo(5116.08, 2)
    expect(pull.gravityNewtons).toBeCloseTo(2683.26, 2)
    expect(pull.groundNewtons).toBeCloseTo(5116.08 - 2683.26, 2)
  })
  it.each([
    ['hard', 0.04],
    ['dryGrass', 0.14],
    ['hardWetSand', 0.17],
    ['softWetSand', 0.2],
    ['gravelOrDrySand', 0.25],
    ['lightMud', 0.33],
    ['mudToRim', 0.75],
    ['wheelDepth', 1],
    ['bodyDepth', 1.33],
  ] as [Ground, number][])('[STD] ground %s holds %f of the weight on the flat', (ground, c) => {
    expect(GROUNDS[ground]).toBe(c)
    const flat = theValue(pullOf(stuck({ slopeDegrees: 0, ground })))
    expect(flat.pullNewtons / (800 * 9.80665)).toBeCloseTo(c, 12)
  })
  it.each([
    [5, 0.0833, 0.0872],
    [15, 0.25, 0.2588],
    [30, 0.5, 0.5],
    [45, 0.75, Math.SQRT1_2],
  ])(
    '[STD] at %i degrees the field rule says %f of the weight, the sine %f',
    (slope, rule, sine) => {
      const pull = theValue(pullOf(stuck({ slopeDegrees: slope, ground: 'hard' })))
      const weight = 800 * 9.80665
      expect((pull.fieldRuleNewtons ?? 0) / weight - 0.04).toBeCloseTo(rule, 4)
      expect(pull.gravityNewtons / weight).toBeCloseTo(sine, 4)
    },
  )
  it('[B1] above 45 degrees the field rule says nothing', () => {
    expect(theValue(pullOf(stuck({ slopeDegrees: 46 }))).fieldRuleNewtons).toBeNull()
  })
  it('[STD] locked wheels add 0.33 of the weight up to half of them, 0.67 above (recovery sheet, seen)', () => {
    expect(LOCKED).toEqual({ none: 0, upToHalf: 0.33, moreThanHalf: 0.67 })
    const free = theValue(pullOf(stuck())).pullNewtons
    const half = theValue(pullOf(stuck({ locked: 'upToHalf' }))).pullNewtons
    expect(half - free).toBeCloseTo(0.33 * 800 * 9.80665, 6)
  })
  it('[B1] pounds for kilograms change nothing: the pull grows straight with the mass', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 2000, noNaN: true }),
        fc.integer({ min: -60, max: 60 }),
        (massKg, slopeDegrees) => {
          const one = theValue(pullOf(stuck({ massKg, slopeDegrees })))
          const twice = theValue(pullOf(stuck({ massKg: 2 * massKg, slopeDegrees })))
          expect(twice.pullNewtons).toBeCloseTo(2 * one.pullNewtons, 6)
          expect(one.withMarginNewtons).toBeCloseTo(1.25 * one.pullNewtons, 6)
        },
      ),
      { seed: 51 },
    )
  })
  it('[A1] names a mass, a slope or a margin that cannot be', () => {
    expect(pullOf(stuck({ massKg: 0 }))).toMatchObject({
      problem: { kind: 'below', field: 'massKg' },
    })
    expect(pullOf(stuck({ slopeDegrees: 61 }))).toMatchObject({
      problem: { field: 'slopeDegrees' },
    })
    expect(pullOf(stuck(), Number.NaN)).toMatchObject({ problem: { field: 'margin' } })
  })
})

describe('the line with sheaves', () => {
  it('[STD] two parts with 10 % loss: F / 1.9 = 2692.67 N (CHECKS 2.10)', () => {
    expect(theValue(linePull(5116.08, 2))).toBeCloseTo(2692.67, 2)
  })
  it('[B3] one part is the pull itself; three are F / 2.71; without loss they share alike', () => {
    expect(theValue(linePull(1000, 1))).toBe(1000)
    expect(theValue(linePull(2710, 3))).toBeCloseTo(1000, 9)
    expect(theValue(linePull(3000, 3, 0))).toBe(1000)
    expect(linePull(1000, 0)).toMatchObject({ problem: { field: 'partsOfLine' } })
    expect(linePull(1000, 1.5)).toMatchObject({ problem: { field: 'partsOfLine' } })
  })
  it('[B3] a block that only turns a single line carries twice the line, and takes its 10 of 100', () => {
    const links: Link[] = [
      { kind: 'winch', ratedNewtons: 20_000 },
      { kind: 'block', ratedNewtons: 15_000 },
    ]
    const got = (partsOfLine: number) =>
      theValue(judgeRig({ withMarginNewtons: 9000, partsOfLine, links }))
    expect(got(1)).toMatchObject({
      verdict: 'refused',
      weakest: { kind: 'block' },
      lineNewtons: expect.closeTo(10_000, 9),
      anchorNewtons: expect.closeTo(20_000, 9),
    })
    // The same block doubles the line: 9 kN / 1.9 in it, and twice that on the block.
    expect(got(2)).toMatchObject({
      verdict: 'offered',
      lineNewtons: expect.closeTo(9000 / 1.9, 9),
      anchorNewtons: expect.closeTo(18_000 / 1.9, 9),
    })
    const weak = judgeRig({
      withMarginNewtons: 9000,
      partsOfLine: 1,
      links: [{ kind: 'winch', ratedNewtons: 9500 }, ...links.slice(1)],
    })
    expect(theValue(weak).partsThatWouldDo).toBe(2)
  })
})

/** S4: unit 31, 680 kg, bogged to the rim on 14 degrees. */
describe('[S4] the bogged side-by-side', () => {
  const pull = theValue(
    pullOf({ massKg: 680, slopeDegrees: 14, ground: 'mudToRim', locked: 'none' }),
  )
  const winch: Link = { kind: 'winch', ratedNewtons: 6700 }
  const strap: Link = { kind: 'strap', ratedNewtons: 10_000 }
  const rig = (partsOfLine: number, ...links: Link[]) =>
    theValue(
      judgeRig({
        withMarginNewtons: pull.withMarginNewtons,
        partsOfLine,
        links: [winch, strap, ...links],
      }),
    )
  it('[S4] pulls 6.47 kN, 8.08 kN with the margin', () => {
    expect(pull.pullNewtons / 1000).toBeCloseTo(6.47, 2)
    expect(pull.withMarginNewtons / 1000).toBeCloseTo(8.08, 2)
  })
  it('[S4] the 6.7 kN winch single line is refused, and it says what to change', () => {
    const single = rig(1)
    expect(single).toMatchObject({
      verdict: 'refused',
      weakest: { kind: 'winch' },
      partsThatWouldDo: 2,
    })
    expect(rigSentences(single)).toEqual([
      'The winch is the weakest link: it would carry 8.08 kN and is rated 6.70 kN. Change it: lay the line twice with one block, or use a winch rated 8.08 kN or more.',
    ])
  })
  it('[S4] with one block the line carries 4.25 kN and is offered; the anchor 8.5 kN, the 10 kN strap passes', () => {
    const double = rig(2)
    expect(double.verdict).toBe('offered')
    expect(double.lineNewtons / 1000).toBeCloseTo(4.25, 2)
    expect(double.anchorNewtons / 1000).toBeCloseTo(8.5, 1)
    expect(double.weakest?.kind).toBe('strap')
    expect(rigSentences(double)).toEqual([
      'The line carries 4.25 kN and the anchor 8.51 kN. The strap is nearest to its limit: 8.51 kN of 10.00 kN.',
    ])
  })
  it('[S4] a 6 kN shackle at the anchor is the weakest link and refused', () => {
    const weak = rig(2, { kind: 'shackle', ratedNewtons: 6000 })
    expect(weak).toMatchObject({ verdict: 'refused', weakest: { kind: 'shackle' } })
    expect(rigSentences(weak)).toEqual([
      'The shackle is the weakest link: it would carry 8.51 kN and is rated 6.00 kN. Change it: use a shackle rated 8.51 kN or more, or share the load between two anchors.',
    ])
  })
  it('[B4] a part without a rating is not offered, an overloaded one beside it is refused first', () => {
    const anchor: Link = { kind: 'anchor', ratedNewtons: null }
    const unknown = rig(2, anchor)
    expect(unknown.verdict).toBe('notRated')
    expect(rigSentences(unknown)[0]).toMatch(/^The anchor bears no working load/)
    const both = rig(1, anchor)
    expect(both.verdict).toBe('refused')
    expect(rigSentences(both)).toHaveLength(2)
  })
  it('[B5] at its rating exactly a part holds, a newton under it does not; the worst comes first', () => {
    const exact = (ratedNewtons: number) =>
      theValue(
        judgeRig({
          withMarginNewtons: 6700,
          partsOfLine: 1,
          links: [winch, { kind: 'hook', ratedNewtons }],
        }),
      )
    expect(exact(6700).verdict).toBe('offered')
    expect(exact(6699).verdict).toBe('refused')
    const two = rigSentences(rig(1, { kind: 'hook', ratedNewtons: 4000 }))
    expect(two[0]).toMatch(/^The hook is the weakest link/)
    expect(two[1]).toMatch(/^The winch is too weak as well/)
  })
  it('[B5] with two parts of line a rig of none but strong enough links is offered, whatever the pull', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1e5, noNaN: true }),
        fc.integer({ min: 1, max: 6 }),
        (pullN, parts) => {
          const line = theValue(linePull(pullN, parts))
          const links: Link[] = [
            { kind: 'winch', ratedNewtons: Math.max(1, line) },
            { kind: 'strap', ratedNewtons: Math.max(1, line * parts) },
          ]
          const got = theValue(judgeRig({ withMarginNewtons: pullN, partsOfLine: parts, links }))
          expect(got.verdict).toBe('offered')
          // The anchor is reckoned at no less than the machine's own pull.
          expect(got.anchorNewtons).toBeGreaterThanOrEqual(pullN - 1e-6)
        },
      ),
      { seed: 52 },
    )
  })
  it('[A1] without a winch, or with a rating of nought, it says so', () => {
    expect(judgeRig({ withMarginNewtons: 1, partsOfLine: 1, links: [] })).toMatchObject({
      problem: { kind: 'noWinch' },
    })
    expect(
      judgeRig({
        withMarginNewtons: 1,
        partsOfLine: 1,
        links: [winch, { kind: 'strap', ratedNewtons: 0 }],
      }),
    ).toMatchObject({ problem: { kind: 'below', field: 'strap.2' } })
  })
  it('[B3] the cautions of a pull carry ANSI Z535.6 words', () => {
    expect(PULL_CAUTIONS.map((c) => c.signal)).toEqual(['WARNING', 'WARNING', 'WARNING'])
  })
})

describe('tow (CHECKS 2.10 factors, rule R10)', () => {
  const towed = { massKg: 300, slopeDegrees: 0, ground: 'dryGrass' as const, brakesWork: false }
  it('[B2] on the flat 0.14 of the weight, nothing to hold back, a line will do', () => {
    const tow = theValue(towOf(towed))
    expect(tow.pullNewtons).toBeCloseTo(0.14 * 300 * 9.80665, 9)
    expect(tow).toMatchObject({ holdBackNewtons: 0, needsRigidBar: false })
  })
  it('[B2] down 15 degrees without brakes: a bar, and W (sin a - c cos a) to hold', () => {
    const tow = theValue(towOf({ ...towed, slopeDegrees: -15 }))
    const weight = 300 * 9.80665
    const a = Math.PI / 12
    expect(tow.needsRigidBar).toBe(true)
    expect(tow.holdBackNewtons).toBeCloseTo(weight * (Math.sin(a) - 0.14 * Math.cos(a)), 6)
    expect(tow.pullNewtons).toBe(0)
    // The bar carries what is held back, with the same margin as a pull.
    expect(tow.withMarginNewtons).toBeCloseTo(1.25 * tow.holdBackNewtons, 9)
    expect(theValue(towOf({ ...towed, slopeDegrees: -15, brakesWork: true }))).toMatchObject({
      holdBackNewtons: 0,
      needsRigidBar: false,
    })
  })
  it('[B2] up a slope it is the pull of a free machine; above 45 degrees no tow', () => {
    const up = theValue(towOf({ ...towed, slopeDegrees: 10 }))
    const pull = theValue(pullOf({ ...towed, slopeDegrees: 10, locked: 'none' }))
    expect(up.withMarginNewtons).toBe(pull.withMarginNewtons)
    expect(towOf({ ...towed, slopeDegrees: 50 })).toMatchObject({
      problem: { field: 'slopeDegrees' },
    })
  })
  it('[R10] names the weakest rated link of a tow against the force with its margin', () => {
    const force = theValue(towOf({ ...towed, slopeDegrees: 10 })).withMarginNewtons
    // 1.25 x 300 kg x 9.80665 x (sin 10 + 0.14 cos 10) = 1,145.6 N.
    expect(force).toBeCloseTo(1145.6, 1)
    const links: Link[] = [
      { kind: 'hook', ratedNewtons: 3000 },
      { kind: 'line', ratedNewtons: 1145 },
      { kind: 'shackle', ratedNewtons: 1146 },
    ]
    const got = theValue(judgeTow(force, links))
    expect(got).toMatchObject({ verdict: 'refused', weakest: { kind: 'line' } })
    expect(rigSentences(got)[0]).toMatch(/^The line is the weakest link: it would carry 1.15 kN/)
    expect(theValue(judgeTow(force, [links[0], links[2]] as Link[]))).toMatchObject({
      verdict: 'offered',
      weakest: { kind: 'shackle' },
    })
    expect(theValue(judgeTow(force, [{ kind: 'strap', ratedNewtons: null }])).verdict).toBe(
      'notRated',
    )
    expect(judgeTow(force, [])).toMatchObject({ problem: { kind: 'noLinks' } })
    expect(judgeTow(Number.NaN, links)).toMatchObject({ problem: { field: 'withMarginNewtons' } })
    expect(judgeTow(force, [{ kind: 'line', ratedNewtons: 0 }])).toMatchObject({
      problem: { field: 'line.1' },
    })
  })
})
