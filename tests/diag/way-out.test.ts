import { describe, expect, it } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import type { Suspect } from '@/lib/diag/belief'
import { indexBook, SOMETHING_ELSE } from '@/lib/diag/book-index'
import {
  decidedWayOut,
  leavingLacks,
  limpRefusals,
  limpUnjudged,
  SAID_BY_HAND,
  type WayOutFacts,
  wayOutNotices,
} from '@/lib/diag/way-out'
import type { JobMachineState } from '@/lib/model/job'
import type { Place } from '@/lib/model/place'
import { entry } from '../field/checks-log'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
const faults = [...index.faults.values()]
/** A fault whose own record does not forbid the ride, and one whose does. */
const harmless = faults.find((fault) => fault.limpRefused === null)?.id ?? ''
const forbidden = faults.find((fault) => fault.limpRefused !== null)

const suspect = (fault: string, chance: number, ruledOutBy: string | null = null): Suspect => ({
  fault,
  name: fault,
  chance,
  prior: chance,
  ruledOutBy,
  why: [],
})
const people = { count: 1, hurt: false, missing: false, exposed: false }
const facts = (more: Partial<WayOutFacts> = {}): WayOutFacts => ({
  job: { people, before: [] },
  features: { strokes: 'four' },
  entries: [],
  suspects: [suspect(harmless, 0.4)],
  index,
  said: [],
  ...more,
})
const rest = (asTyped: string, subject: 'suspect' | 'knownGood' = 'suspect') =>
  entry({
    kind: 'reading',
    checkId: 'batteryRest',
    quantity: 'dcVoltage',
    value: Number(asTyped),
    unit: 'V',
    asTyped,
    overRange: false,
    subject,
    meterId: '01980000-0000-7000-8000-000000000401',
    meterName: 'Pocket meter (demo)',
    meterFunction: { percent: 0.5, digits: 2, resolution: 0.01 },
    leadsOhm: { low: 0.3, high: 0.6 },
    nulled: false,
    partTempC: null,
    meterTempC: 20,
    perKelvin: 0.1,
    spec: null,
    result: null,
  })
const fix = () =>
  entry({ kind: 'fix', fault: 'ignitionCoilPart', words: 'New coil', temporary: null })
const run = (seen: number) =>
  entry({
    kind: 'proofRun',
    starts: 12,
    minutes: 10,
    faults: seen,
    hot: true,
    words: null,
    boundExact: null,
    boundRuleOfThree: null,
  })

describe('limping out', () => {
  it('[R10] is not refused when nothing speaks against it', () => {
    expect(limpRefusals(facts())).toEqual([])
  })

  it.each(SAID_BY_HAND)('[R10] is refused when the person says: %s', (what) => {
    expect(limpRefusals(facts({ said: [what] }))).toEqual([{ kind: 'said', what }])
  })

  it('[R10] is refused with somebody hurt, said once when the rider is unfit anyway', () => {
    const job = { people: { ...people, hurt: true }, before: [] }
    expect(limpRefusals(facts({ job }))).toEqual([{ kind: 'hurt' }])
    expect(limpRefusals(facts({ job, said: ['unfit'] }))).toEqual([{ kind: 'said', what: 'unfit' }])
  })

  // Rule R10: at or below 11.9 V at rest counts as empty, just over the 11.89 V of the table (facts of CHECKS 2.6).
  it('[R10] is refused with a battery at 11.90 V at rest, not at 11.91 V', () => {
    const low = rest('11.90')
    expect(limpRefusals(facts({ entries: [low] }))).toEqual([
      { kind: 'emptyBattery', entryId: low.id, asTyped: '11.90', unit: 'V', emptyAtVolts: 11.9 },
    ])
    expect(limpRefusals(facts({ entries: [rest('11.91')] }))).toEqual([])
  })

  it('[R10] looks at the last living reading of its own battery', () => {
    expect(limpRefusals(facts({ entries: [rest('11.86'), rest('12.45')] }))).toEqual([])
    expect(limpRefusals(facts({ entries: [rest('12.45'), rest('11.86')] }))).toHaveLength(1)
    expect(limpRefusals(facts({ entries: [rest('11.86', 'knownGood')] }))).toEqual([])
    const low = rest('11.86')
    const taken = entry({ kind: 'correction', reason: 'Wrong machine' }, low.id)
    expect(limpRefusals(facts({ entries: [low, taken] }))).toEqual([])
  })

  it('[R10] is refused for an unknown cause on a two-stroke, and on one not known to be a four-stroke', () => {
    const of = (more: Partial<WayOutFacts>) => limpRefusals(facts(more))
    expect(of({ features: { strokes: 'two' } })).toEqual([{ kind: 'causeUnknown', strokes: 'two' }])
    expect(of({ features: {} })).toEqual([{ kind: 'causeUnknown', strokes: 'notKnown' }])
  })

  it('[R10] the cause is known from 90 of 100 on, or with a fix; "something else" never is', () => {
    const two = (more: Partial<WayOutFacts>) =>
      limpRefusals(facts({ features: { strokes: 'two' }, ...more }))
    expect(two({ suspects: [suspect(harmless, 0.9)] })).toEqual([])
    expect(two({ suspects: [suspect(harmless, 0.89)] })).toHaveLength(1)
    expect(two({ suspects: [suspect(SOMETHING_ELSE, 0.95)] })).toHaveLength(1)
    expect(two({ suspects: [suspect(harmless, 0.95, 'entry')] })).toHaveLength(1)
    expect(two({ suspects: [] })).toHaveLength(1)
    expect(two({ entries: [fix()] })).toEqual([])
  })

  it('[R10] is refused by a fault of 25 of 100 or more whose own record forbids the ride', () => {
    const fault = forbidden?.id ?? ''
    const of = (...suspects: Suspect[]) => limpRefusals(facts({ suspects }))
    expect(of(suspect(fault, 0.25))).toEqual([
      { kind: 'faultForbids', fault, name: fault, bookWords: forbidden?.limpRefused },
    ])
    expect(of(suspect(fault, 0.24))).toEqual([])
    expect(of(suspect(fault, 0.6, 'entry'))).toEqual([])
    expect(limpRefusals(facts({ suspects: [suspect(fault, 0.6)], entries: [fix()] }))).toEqual([])
    expect(limpRefusals(facts({ suspects: [suspect(fault, 0.6)], index: null }))).toEqual([])
  })
})

describe('what is not there yet', () => {
  it('[F6] a repair without a fix, without a proof run, or with the fault in its last run', () => {
    const repair = (...entries: WayOutFacts['entries']) =>
      wayOutNotices('repairHere', facts({ entries }))
    expect(repair()).toEqual(['noFix', 'noProofRun'])
    expect(repair(fix())).toEqual(['noProofRun'])
    expect(repair(fix(), run(1))).toEqual(['faultInProofRun'])
    expect(repair(fix(), run(1), run(0))).toEqual([])
    expect(wayOutNotices('tow', facts())).toEqual([])
  })

  it.each(['water', 'rollover'] as const)('[R3] after %s every way out asks for a look', (went) => {
    const job = { people, before: [went] }
    expect(wayOutNotices('limpOut', facts({ job }))).toEqual(['examineFirst'])
    expect(wayOutNotices('repairHere', facts({ job }))).toContain('examineFirst')
  })
})

describe('what could not be judged', () => {
  const fix = () => entry({ kind: 'fix', fault: harmless, words: 'Cleaned', temporary: null })

  it('[R10] without belief or book nothing is judged by leaving it out', () => {
    expect(limpUnjudged(facts())).toEqual([])
    expect(limpUnjudged(facts({ suspects: null }))).toEqual(['cause', 'faults'])
    expect(limpUnjudged(facts({ index: null }))).toEqual(['battery', 'faults'])
    expect(limpUnjudged(facts({ index: null, suspects: null }))).toEqual([
      'battery',
      'cause',
      'faults',
    ])
  })

  it('[R10] a four-stroke before its suspects are known is refused nothing, so it must say so', () => {
    const early = facts({ suspects: null })
    expect(limpRefusals(early)).toEqual([])
    expect(limpUnjudged(early)).not.toEqual([])
  })

  it('[R10] with a fix on record cause and faults are not asked', () => {
    expect(limpUnjudged(facts({ suspects: null, entries: [fix()] }))).toEqual([])
    expect(limpUnjudged(facts({ index: null, suspects: null, entries: [fix()] }))).toEqual([
      'battery',
    ])
  })
})

describe('the way out that stands', () => {
  const decided = (wayOut: 'tow' | 'returnLater', machineState: JobMachineState = 'onTow') =>
    entry({ kind: 'wayOut', wayOut, reasons: 'Dark', machineState, peopleState: 'onTheWay' })
  const correct = (id: string) => entry({ kind: 'correction', reason: 'Wrong' }, id)

  it('[R8] is the last one nobody took back', () => {
    const first = decided('tow')
    const second = decided('returnLater', 'leftBehind')
    expect(decidedWayOut([])).toBeUndefined()
    expect(decidedWayOut([first, second])?.id).toBe(second.id)
    expect(decidedWayOut([first, second, correct(second.id)])?.id).toBe(first.id)
    expect(decidedWayOut([first, correct(first.id)])).toBeUndefined()
  })

  const place: Place = {
    latitude: 47.1,
    longitude: -93.2,
    source: 'typed',
    accuracyMetres: null,
    at: '2026-11-24T18:40:00.000Z',
    asTyped: '47.1 N 93.2 W',
    words: null,
  }
  const photo = () =>
    entry({
      kind: 'photo',
      photo: { hash: 'a'.repeat(64), mime: 'image/jpeg', bytes: 9, width: 1, height: 1 },
      caption: null,
    })

  it('[R2] leaves a machine behind only with position, living photo and the words that go with it', () => {
    const [seen, left] = [photo(), decided('returnLater', 'leftBehind')]
    expect(leavingLacks({ place, entries: [seen, left] })).toBeNull()
    expect(leavingLacks({ place: null, entries: [seen, left] })).toBe('place')
    expect(leavingLacks({ place, entries: [left] })).toBe('photo')
    expect(leavingLacks({ place, entries: [seen, correct(seen.id), left] })).toBe('photo')
    expect(leavingLacks({ place, entries: [seen] })).toBe('wayOut')
    expect(leavingLacks({ place, entries: [seen, decided('tow')] })).toBe('wayOut')
    expect(leavingLacks({ place, entries: [seen, left, correct(left.id)] })).toBe('wayOut')
  })
})
