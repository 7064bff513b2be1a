import { describe, expect, it } from 'vitest'
import { bookView, type JobsBook } from '@/components/store/use-book'
import { belief } from '@/lib/diag/belief'
import { bookChanges } from '@/lib/diag/book-changes'
import { type BookIndex, indexBook } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { restsOn, verdictChange, withoutWithdrawn } from '@/lib/diag/withdrawn'
import { withdrawnVersions } from '@/lib/diag/withdrawn-in'
import type { BookWithdrawal } from '@/lib/model/book-withdrawal'
import type { CheckItem, CodeBookItem } from '@/lib/model/code-book'
import type { LogBody, LogEntry, ReadingBody } from '@/lib/model/log-entry'
import type { BookView } from '@/lib/sync/client/views'
import { smallRightBook } from '../support/book-fixture'
import { AT, newId } from '../support/shop-fixture'

const items = smallRightBook()
const indexOf = (of: CodeBookItem[], version = 1) =>
  indexBook({ version, hash: '', publishedAt: AT, items: of })
const book = indexOf(items)

const withdrawal = (of: Partial<BookWithdrawal>): BookWithdrawal => ({
  id: newId(),
  what: 'check',
  itemId: 'lookAtPlug',
  name: 'Look at the plug',
  reason: 'It may be hot.',
  instead: null,
  at: AT,
  by: null,
  versions: [1],
  upTo: 1,
  heard: [],
  ...of,
})

const jobId = newId()
const entry = (body: LogBody): LogEntry => ({
  id: newId(),
  jobId,
  supersedes: null,
  happenedAt: AT,
  writtenAt: AT,
  zone: 'Etc/UTC',
  authorId: newId(),
  deviceId: newId(),
  engineVersion: '1',
  bookVersion: 1,
  body,
})
const wet = entry({
  kind: 'check',
  checkId: 'lookAtPlug',
  outcome: 'wet',
  asWritten: true,
  differed: null,
})
const beliefIn = (index: BookIndex, entries: LogEntry[]) =>
  belief(
    buildCase({
      index,
      features: {},
      spec: null,
      job: { complaint: { words: 'It dies', symptom: 'stalls', lampOn: null } },
      entries,
    }),
  )

describe('[R23] [CB41] a book without what was withdrawn from it', () => {
  it('[CB41] has the check no more, and what it said does not count', () => {
    const without = withoutWithdrawn(book, [withdrawal({})])
    expect(without.checks.has('lookAtPlug')).toBe(false)
    expect(book.checks.has('lookAtPlug')).toBe(true)
    expect(beliefIn(without, [wet]).suspects.map(({ chance }) => chance)).toEqual(
      beliefIn(without, []).suspects.map(({ chance }) => chance),
    )
    expect(beliefIn(without, [wet]).suspects).not.toEqual(beliefIn(book, [wet]).suspects)
  })

  it('[CB41] is the very same index when nothing of it is withdrawn', () => {
    expect(withoutWithdrawn(book, [])).toBe(book)
    expect(withoutWithdrawn(book, [withdrawal({ versions: [2], upTo: 2 })])).toBe(book)
    expect(withoutWithdrawn(book, [withdrawal({ what: 'version', itemId: null })])).toBe(book)
  })

  it('[CB41] holds in a version the shop has not spoken of yet', () => {
    const later = withoutWithdrawn(indexOf(items, 3), [withdrawal({ versions: [1], upTo: 2 })])
    expect(later.checks.size).toBe(0)
    const spoken = withoutWithdrawn(indexOf(items, 3), [withdrawal({ versions: [1], upTo: 3 })])
    expect(spoken.checks.size).toBe(1)
  })

  it('[CB41] suspects a withdrawn fault no more', () => {
    const without = withoutWithdrawn(book, [withdrawal({ what: 'fault', itemId: 'plugWet' })])
    const names = beliefIn(without, [wet]).suspects.map(({ fault }) => fault)
    expect(names).not.toContain('plugWet')
    expect(names).toContain('plugWorn')
  })

  it('[CB41] judges by the book’s own limit no more, and by the spec sheet’s as before', () => {
    const ohms: CheckItem = {
      ...(items.find((item) => item.kind === 'check') as CheckItem),
      id: 'plugOhms',
      reading: {
        quantity: 'resistance',
        component: 'plug',
        value: 'resistance',
        fallback: { low: 4000, high: 6000, unit: 'ohm', source: 'common practice, no source' },
        good: [{ weight: 1, from: 0.8, to: 1.2 }],
        byFault: { plugWorn: [{ weight: 1, from: 2, to: 4 }] },
      },
    }
    const index = indexOf([...items, ohms])
    const without = withoutWithdrawn(index, [withdrawal({ what: 'limit', itemId: 'plugOhms' })])
    expect(without.checks.get('plugOhms')?.reading?.fallback).toBeNull()
    const ofBook = { low: 4000, high: 6000, source: 'common practice, no source' }
    const ofSheet = { low: 4000, high: 6000, source: 'maker’s sheet' }
    const read = (spec: typeof ofBook) => entry(reading(spec))
    const move = (of: BookIndex, spec: typeof ofBook) =>
      verdictChange(beliefIn(of, []), beliefIn(of, [read(spec)]))
    expect(move(index, ofBook)).not.toBeNull()
    expect(move(without, ofBook)).toBeNull()
    expect(move(without, ofSheet)).not.toBeNull()
    expect(restsOn(read(ofBook), { what: 'limit', itemId: 'plugOhms' })).toBe(true)
  })
})

const reading = (spec: { low: number; high: number; source: string }): ReadingBody => ({
  kind: 'reading',
  checkId: 'plugOhms',
  quantity: 'resistance',
  value: 15_000,
  unit: 'ohm',
  asTyped: '15000',
  overRange: false,
  subject: 'suspect',
  meterId: newId(),
  meterName: 'Meter',
  meterFunction: { percent: 1, digits: 2, resolution: 10 },
  leadsOhm: { low: 0, high: 0 },
  nulled: true,
  partTempC: 20,
  meterTempC: 20,
  perKelvin: 0,
  spec: {
    id: 'resistance',
    name: 'Resistance',
    quantity: 'resistance',
    unit: 'ohm',
    nominal: null,
    tolerancePercent: null,
    partTempC: null,
    material: null,
    conditions: null,
    ...spec,
  },
  result: null,
})

describe('[CB38] the book a screen works with', () => {
  const [first, second] = [indexOf(items, 1), indexOf(items, 2)]
  const held: BookView = {
    status: 'ready',
    index: second,
    version: 2,
    versions: [1, 2],
    of: (version) => (version === 1 ? first : version === 2 ? second : null),
  }
  const job = (of: Partial<JobsBook>): JobsBook => ({
    version: 1,
    newerSeen: null,
    missing: null,
    newest: 2,
    opening: false,
    ...of,
  })

  it('[CB38] is the job’s version inside a job, else the newest that was not withdrawn', () => {
    expect(bookView(held, null, [])).toMatchObject({ version: 2, index: second })
    expect(bookView(held, job({}), [])).toMatchObject({ version: 1, index: first })
    expect(bookView(held, job({ opening: true }), [])).toMatchObject({ status: 'opening' })
    const gone = withdrawal({ what: 'version', itemId: null, versions: [2], upTo: 2 })
    expect(withdrawnVersions([gone])).toEqual(new Set([2]))
    expect(bookView(held, null, [gone])).toMatchObject({ version: 1, index: first })
  })

  it('[CB41] is read without what was withdrawn, in every version', () => {
    const taken = [withdrawal({ versions: [1, 2], upTo: 2 })]
    const asked: unknown[] = []
    const of: BookView['of'] = (version, without) => {
      asked.push([version, without])
      return held.of(version)
    }
    bookView({ ...held, of }, job({}), taken).of(2)
    expect(asked).toEqual([
      [1, taken],
      [2, taken],
    ])
  })
})

describe('[CB38] what another version says otherwise', () => {
  it('[CB38] is told by kind and name; the order of fields is no change', () => {
    const [plugWorn] = items.filter((item) => item.kind === 'fault')
    const changed = items.flatMap((item): CodeBookItem[] => {
      if (item.kind === 'check') return [{ ...item, minutes: 1 }]
      if (item.kind === 'fault' && item.id === 'plugWet') return []
      return [Object.fromEntries(Object.entries(item).reverse()) as CodeBookItem]
    })
    const more = plugWorn ? [{ ...plugWorn, id: 'fuse', name: 'Fuse' } as CodeBookItem] : []
    expect(bookChanges(book, indexOf([...changed, ...more], 2))).toEqual([
      { kind: 'faults', added: ['Fuse'], changed: [], gone: ['Plug wet with fuel'] },
      { kind: 'checks', added: [], changed: ['Look at the plug'], gone: [] },
    ])
    expect(bookChanges(book, indexOf(items, 2))).toEqual([])
  })
})
