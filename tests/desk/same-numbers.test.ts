import { describe, expect, it } from 'vitest'
import { latestReading } from '@/components/desk/job/latest-reading'
import { questionOf } from '@/components/desk/job/use-job-case'
import { specForEngine } from '@/components/engine/spec-kept'
import { workOut } from '@/components/engine/work'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { DEMO_MODELS } from '@/db/codebook/demo-models'
import { indexBook } from '@/lib/diag/book-index'
import { codeBook } from '@/lib/model/code-book'
import { type DeskJob, deskJob } from '@/lib/model/desk'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import { METER } from '@/scripts/demo-shop'
import { AT, newId, openingOf } from '../support/shop-fixture'

const book = codeBook.parse({ version: 1, hash: 'x', publishedAt: AT, items: BOOK_ITEMS })
const index = indexBook(book)
const model = DEMO_MODELS[0]!
const jobId = newId()
const opening = openingOf(jobId, newId())
const at = (minute: number) => `2026-11-24T18:${String(minute).padStart(2, '0')}:00.000Z`

const entry = (minute: number, body: LogBody, more: Partial<LogEntry> = {}): LogEntry => ({
  id: newId(),
  jobId,
  supersedes: null,
  happenedAt: at(minute),
  writtenAt: at(minute),
  zone: 'Etc/GMT+6',
  authorId: newId(),
  deviceId: newId(),
  engineVersion: '1',
  bookVersion: 1,
  body,
  ...more,
})

const spec = model
  .specSheet!.components.find(({ id }) => id === 'ignitionCoil1')!
  .values.find(({ id }) => id === 'primaryResistance')!
const reading = (subject: 'suspect' | 'knownGood'): LogBody => ({
  kind: 'reading',
  checkId: 'coilPrimaryResistance',
  quantity: 'resistance',
  value: 1,
  unit: 'ohm',
  asTyped: '1.0',
  overRange: false,
  subject,
  meterId: METER.id,
  meterName: METER.name,
  meterFunction: METER.functions.resistance!,
  leadsOhm: METER.leadsOhm,
  nulled: false,
  partTempC: 20,
  meterTempC: 20,
  perKelvin: METER.perKelvin,
  spec,
  result: null,
})
const swap = (
  step: 'spareFitted' | 'oldRefitted' | 'newFitted',
  faultPresent: boolean,
): LogBody => ({
  kind: 'swap',
  swapId: 'coilSwap',
  step,
  faultPresent,
  partFrom: 'bag',
  partWords: null,
})
const wrong = entry(4, { kind: 'note', words: 'Wrong job' })
const entries = [
  entry(1, {
    kind: 'code',
    seen: { format: 'spn', spn: 1268, fmi: 3 },
    context: { module: 0, status: 'active', count: null, order: 1, photo: null },
  }),
  entry(2, reading('suspect')),
  entry(3, reading('knownGood')),
  wrong,
  entry(5, { kind: 'correction', reason: 'Not here' }, { supersedes: wrong.id }),
  entry(6, swap('spareFitted', false)),
  entry(7, swap('oldRefitted', true)),
  entry(8, swap('newFitted', false)),
]

/** The job as the desk gets it: through JSON and the schema, in the shop's order, with the shop's fields. */
function atTheDesk(order: readonly LogEntry[]): DeskJob {
  const rows = order.map((one, i) => ({ ...one, receivedAt: AT, order: i + 1, hash: `h${i}` }))
  return deskJob.parse(
    JSON.parse(
      JSON.stringify({
        seq: 9,
        shop: {
          id: newId(),
          name: 'Test',
          zone: 'Etc/GMT+6',
          currency: 'USD',
          perMinuteMinor: 1,
          towMinor: 1,
          recoveryMinor: 1,
          emergencyNumber: '112',
          phone: '0',
        },
        job: {
          ...opening,
          number: 'J-0001',
          state: 'open',
          peopleState: 'withMachine',
          machineState: 'stranded',
          wayOut: null,
          openedBy: newId(),
          assignedTo: [],
        },
        machineWords: 'Unit 14',
        reachedAt: null,
        machine: {
          id: opening.machineId,
          modelId: model.id,
          unitNumber: '14',
          makerTyped: null,
          modelTyped: null,
          year: null,
          serial: null,
          hours: null,
          features: {},
          fleet: true,
        },
        model,
        entries: rows,
        photos: [],
        phones: [],
        parts: [],
        people: [],
      }),
    ),
  )
}

/** What the phone asks its engine: its own rows, the meter in the bag and all (components/engine/use-case.ts). */
const onThePhone = {
  case: {
    features: { ...model.features },
    spec: specForEngine(model.specSheet),
    job: { complaint: opening.complaint },
    entries,
    meter: METER,
  },
  means: null,
  outlookOf: [],
}

describe('the desk reckons as the phone does', () => {
  it('[R5] every suspect stands at the very same chance, in the same order', () => {
    const phone = workOut(index, onThePhone).belief
    const desk = workOut(index, questionOf(atTheDesk(entries))).belief
    expect(desk).toEqual(phone)
    // Issue story step 5: above 90 of 100 after the swap back and the new coil.
    expect(desk.suspects[0]).toMatchObject({ fault: 'ignitionCoilPart' })
    expect(desk.suspects[0]!.chance).toBeGreaterThan(0.9)
  })

  it('[R13] also when the entries reached the shop in another order', () => {
    const mixed = [
      entries[3]!,
      entries[4]!,
      entries[7]!,
      entries[0]!,
      entries[2]!,
      entries[1]!,
      entries[5]!,
      entries[6]!,
    ]
    const desk = workOut(index, questionOf(atTheDesk(mixed))).belief
    expect(desk).toEqual(workOut(index, onThePhone).belief)
  })

  it('[F4] shows the reading of the suspect part, and what the known-good one read', () => {
    const latest = latestReading(entries)
    expect(latest?.read.body.subject).toBe('suspect')
    expect(latest?.twin?.body.subject).toBe('knownGood')
    expect(latestReading([wrong])).toBeNull()
  })
})
