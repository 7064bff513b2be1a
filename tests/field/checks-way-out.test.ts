import { describe, expect, it } from 'vitest'
import { movesOf } from '@/components/outcome/way-out-form'
import { limpRefusals, notices, type WayOutFacts } from '@/components/outcome/way-out-rules'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { indexBook } from '@/lib/diag/book-index'
import { entry } from './checks-log'

const index = indexBook({ version: 1, hash: '', publishedAt: '', items: BOOK_ITEMS })
/** A fault whose own record does not forbid the ride. */
const harmless = [...index.faults.values()].find((fault) => fault.limpRefused === null)?.id ?? ''

describe('the way out', () => {
  const suspect = (fault: string, chance: number) =>
    ({ fault, name: fault, chance, prior: chance, ruledOutBy: null, why: [] }) as const
  const facts = (more: Partial<WayOutFacts> = {}): WayOutFacts => ({
    job: { people: { count: 1, hurt: false, missing: false, exposed: false }, before: [] },
    features: { strokes: 'four' },
    entries: [],
    suspects: [suspect(harmless, 0.4) as never],
    index,
    said: [],
    ...more,
  })
  const rest = (asTyped: string) =>
    entry({
      kind: 'reading',
      checkId: 'batteryRest',
      quantity: 'dcVoltage',
      value: Number(asTyped),
      unit: 'V',
      asTyped,
      overRange: false,
      subject: 'suspect',
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

  it('[R10] refuses to limp with what the person says', () => {
    expect(limpRefusals(facts())).toEqual([])
    expect(limpRefusals(facts({ said: ['noBrake', 'fuelLeak'] }))).toEqual([
      'No working brake.',
      'Fuel leak.',
    ])
  })

  it('[R10] refuses with somebody hurt', () => {
    const job = { people: { count: 1, hurt: true, missing: false, exposed: false }, before: [] }
    expect(limpRefusals(facts({ job }))).toEqual(['Somebody is hurt.'])
  })

  it('[R10] a battery at 11.9 V or less counts as empty, 11.91 does not', () => {
    expect(limpRefusals(facts({ entries: [rest('11.86')] }))[0]).toMatch(/^Battery empty: 11\.86 V/)
    expect(limpRefusals(facts({ entries: [rest('11.90')] }))).toHaveLength(1)
    expect(limpRefusals(facts({ entries: [rest('11.91')] }))).toEqual([])
    expect(limpRefusals(facts({ entries: [rest('11.86'), rest('12.45')] }))).toEqual([])
  })

  it('[R10] an unknown cause refuses a two-stroke, and one not known to be a four-stroke', () => {
    const two = { features: { strokes: 'two' } } as const
    expect(limpRefusals(facts(two))[0]).toMatch(/two-stroke/)
    expect(limpRefusals(facts({ features: {} }))).toHaveLength(1)
    const known = { ...two, suspects: [suspect(harmless, 0.95) as never] }
    expect(limpRefusals(facts(known))).toEqual([])
    const fix = entry({
      kind: 'fix',
      fault: 'ignitionCoilPart',
      words: 'New coil',
      temporary: null,
    })
    expect(limpRefusals(facts({ ...two, entries: [fix] }))).toEqual([])
  })

  it('[R10] a likely fault whose own record forbids the ride refuses it', () => {
    const forbidden = [...index.faults.values()].find((fault) => fault.limpRefused !== null)
    const name = forbidden?.id ?? ''
    const list = (chance: number) => facts({ suspects: [suspect(name, chance) as never] })
    expect(limpRefusals(list(0.3)).join(' ')).toContain(forbidden?.limpRefused ?? 'none')
    expect(limpRefusals(list(0.2))).toEqual([])
  })

  it('[F6] a repair without a fix or with a failed proof run says so', () => {
    const run = (faults: number) =>
      entry({
        kind: 'proofRun',
        starts: 12,
        minutes: 10,
        faults,
        hot: true,
        words: null,
        boundExact: null,
        boundRuleOfThree: null,
      })
    expect(notices('repairHere', facts())).toEqual([
      'No fix is on record.',
      'No proof run is on record.',
    ])
    expect(notices('repairHere', facts({ entries: [run(1)] }))).toContain(
      'The fault came in the last proof run: the repair is not proved.',
    )
    expect(notices('tow', facts())).toEqual([])
  })

  it('[R2] moves machine, people and job beside each other, only what changes', () => {
    const job = {
      id: 'j',
      machineState: 'stranded',
      peopleState: 'withMachine',
      state: 'open',
    } as const
    expect(movesOf(job, { machine: 'runs', people: 'withMachine' }).map((op) => op.kind)).toEqual([
      'job.machine',
      'job.move',
    ])
    const left = movesOf(job, { machine: 'leftBehind', people: 'onTheWay' })
    expect(left.at(-1)).toMatchObject({
      kind: 'job.move',
      fields: { from: 'open', to: 'waitingRetrieval' },
    })
    const waiting = { ...job, state: 'waitingParts', machineState: 'runs' } as const
    expect(movesOf(waiting, { machine: 'runs', people: 'withMachine' })).toEqual([])
  })
})
