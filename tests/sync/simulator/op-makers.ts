// What a person may write in the field: one row per kind of op. A new kind is one more row.
import type { Id } from '@/lib/model/id'
import type { Job } from '@/lib/model/job'
import type { LogBody, LogEntry } from '@/lib/model/log-entry'
import type { MachineRow } from '@/lib/model/machine'
import type { PartRequestRow } from '@/lib/model/part-request'
import { movesFrom } from '@/lib/shop/job-states'
import { may, mayLog } from '@/lib/shop/permissions'
import type { RowOf, StoredEntity } from '@/lib/sync/client/entities'
import type { NewPhoto } from '@/lib/sync/client/views'
import type { OpInput, OpKind } from '@/lib/sync/protocol/op'
import { jobOpen, machineAdd, partRequestAsk } from '../../support/field-ops'
import type { Draw } from './draw'
import type { Tab } from './handset'
import { pictureOf } from './pictures'
import { NO_MACHINE } from './shop-set'
import { VALUE_MAKERS } from './value-makers'

/** What the person sees on the phone, and what is left to chance. */
export type View = {
  draw: Draw
  tab: Tab
  jobs: Job[]
  machines: MachineRow[]
  entries: LogEntry[]
  requests: PartRequestRow[]
  next(): Id
  now(): string
}

export type Made = { ops: OpInput[]; photos?: NewPhoto[]; isOdd?: boolean }

export type Maker = {
  kind: OpKind
  weight: number
  /** Schema it came with, for phones of the one before. */
  since?: 2
  /** Undefined when there is nothing on this phone to write it about. */
  make(view: View): Made | undefined
}

export const MAKERS: Maker[] = [
  { kind: 'machine.add', weight: 3, make: addMachine },
  { kind: 'job.open', weight: 5, make: openJob },
  { kind: 'log.add', weight: 14, make: writeEntry },
  { kind: 'log.add', weight: 3, make: takePhoto },
  { kind: 'log.add', weight: 2, make: correct },
  { kind: 'log.add', weight: 1, make: writeIntoNothing },
  { kind: 'job.move', weight: 6, make: moveJob },
  { kind: 'job.people', weight: 2, make: movePeople },
  { kind: 'job.machine', weight: 2, make: moveMachine },
  { kind: 'partRequest.ask', weight: 4, make: askForParts },
  { kind: 'advice.keep', weight: 2, make: keepAdvice },
  ...VALUE_MAKERS,
]

/** Reads what this tab shows, in an order that does not depend on the store. */
export async function viewOf(tab: Tab, draw: Draw, next: () => Id): Promise<View> {
  return {
    draw,
    tab,
    jobs: await rowsOf(tab, 'job'),
    machines: await rowsOf(tab, 'machine'),
    entries: await rowsOf(tab, 'logEntry'),
    requests: (await rowsOf(tab, 'partRequest')) as PartRequestRow[],
    next,
    now: () => tab.phone.stamp.instant(),
  }
}

/** Every row of a kind as the screens of this tab see it, by id. */
export async function rowsOf<E extends StoredEntity>(tab: Tab, entity: E): Promise<RowOf<E>[]> {
  const { db, keys, cache } = tab.phone.core
  const records = await db.row.where('entity').equals(entity).toArray()
  records.sort((a, b) => (a.id < b.id ? -1 : 1))
  return (await Promise.all(records.map((record) => cache.row(keys, record)))) as RowOf<E>[]
}

/** Whether this person may: most people do not try what they may not. */
export const tries = (view: View, allowed: boolean) => allowed || view.draw.chance(0.05)
export const rolesOf = ({ tab }: View) => tab.user.person.roles
const jobOf = (view: View) => view.draw.pick(view.jobs)

function addMachine(view: View): Made | undefined {
  if (!tries(view, may(rolesOf(view), 'machine.add'))) return undefined
  const isOdd = view.draw.chance(0.05)
  const modelId = isOdd ? view.next() : null
  return { ops: [machineAdd({ ...NO_MACHINE, id: view.next(), modelId })], isOdd }
}

function openJob(view: View): Made | undefined {
  if (!tries(view, may(rolesOf(view), 'job.open'))) return undefined
  const old = view.draw.pick(view.machines)
  const own = may(rolesOf(view), 'machine.add') && view.draw.chance(0.6)
  if (!own && old === undefined) return undefined
  const machine = machineAdd({ ...NO_MACHINE, id: view.next() })
  const machineId = own || old === undefined ? machine.fields.id : old.id
  const job = jobOpen(machineId, { id: view.next(), openedAt: view.now() })
  const ops: OpInput[] = own ? [machine, job] : [job]
  if (view.draw.chance(0.4)) ops.push(entry(view, job.fields.id, note(view)))
  return { ops }
}

function entry(view: View, jobId: Id, body: LogBody, supersedes?: Id): OpInput {
  const more = supersedes === undefined ? {} : { supersedes }
  return view.tab.phone.entry(jobId, body, { bookVersion: 1, ...more })
}

const note = ({ draw, tab }: View): LogBody => ({
  kind: 'note',
  words: `${tab.user.person.name} ${'saw '.repeat(draw.between(1, 12))}${draw.below(1000)}`,
})

/** Entries of every kind that needs no code book. */
const BODIES: ((view: View) => LogBody)[] = [
  note,
  () => ({ kind: 'symptom', symptom: 'startsThenDies', conditions: [], words: null }),
  () => ({ kind: 'codesUnreadable', reason: 'No socket' }),
  () => ({ kind: 'codesCleared', readAgain: 'notYet' }),
  () => ({ kind: 'couldNot', checkId: 'coilPrimaryResistance', reason: 'Too wet' }),
  ({ draw }) => ({
    kind: 'check',
    checkId: 'sparkAtPlug',
    outcome: draw.oneOf(['spark', 'noSpark']),
    asWritten: true,
    differed: null,
  }),
  () => ({ kind: 'fix', fault: 'waterInFuel', words: 'Drained', temporary: null }),
  ({ draw }) => ({
    kind: 'wayOut',
    wayOut: draw.oneOf(['repairHere', 'limpOut', 'tow', 'returnLater']),
    reasons: 'Snow comes in',
    machineState: 'stranded',
    peopleState: 'withMachine',
  }),
  () => ({ kind: 'people', to: 'onTheWay', words: null }),
]

function writeEntry(view: View): Made | undefined {
  const job = jobOf(view)
  if (job === undefined) return undefined
  const ops = Array.from({ length: view.draw.between(1, 4) }, () => view.draw.oneOf(BODIES)(view))
    .filter((body) => tries(view, mayLog(rolesOf(view), body.kind, false)))
    .map((body) => entry(view, job.id, body))
  return ops.length === 0 ? undefined : { ops }
}

function takePhoto(view: View): Made | undefined {
  const job = jobOf(view)
  if (job === undefined || !mayLog(rolesOf(view), 'photo', false)) return undefined
  const { bytes, hash, ref } = pictureOf(view.next())
  const op = entry(view, job.id, { kind: 'photo', photo: ref, caption: null })
  return { ops: [op], photos: [{ hash, jobId: job.id, bytes, mime: ref.mime }] }
}

function correct(view: View): Made | undefined {
  const wrong = view.draw.pick(view.entries)
  if (wrong === undefined) return undefined
  return { ops: [entry(view, wrong.jobId, { kind: 'correction', reason: 'Misread' }, wrong.id)] }
}

/** An entry of a job that nobody knows: it waits, and holds nothing else up. */
function writeIntoNothing(view: View): Made | undefined {
  return { ops: [entry(view, view.next(), note(view))], isOdd: true }
}

function moveJob(view: View): Made | undefined {
  const job = jobOf(view)
  const to = job && view.draw.pick(movesFrom('job', job.state))
  if (!job || !to) return undefined
  if (!tries(view, may(rolesOf(view), to === 'closed' ? 'job.close' : 'job.work'))) return undefined
  const fields = { from: job.state, to, reason: null }
  const ops: OpInput[] = [{ kind: 'job.move', jobId: job.id, fields }]
  if (view.draw.chance(0.3)) ops.push(entry(view, job.id, note(view)))
  return { ops }
}

function movePeople(view: View): Made | undefined {
  const job = jobOf(view)
  const to = job && view.draw.pick(movesFrom('people', job.peopleState))
  if (!job || !to) return undefined
  return { ops: [{ kind: 'job.people', jobId: job.id, fields: { from: job.peopleState, to } }] }
}

function moveMachine(view: View): Made | undefined {
  const job = jobOf(view)
  const to = job && view.draw.pick(movesFrom('machine', job.machineState))
  if (!job || !to) return undefined
  // Leaving a machine behind needs a position, a photo and five lines: most people see to that first (R2).
  const isOdd = to === 'leftBehind'
  if (isOdd && !view.draw.chance(0.1)) return undefined
  return {
    isOdd,
    ops: [{ kind: 'job.machine', jobId: job.id, fields: { from: job.machineState, to } }],
  }
}

function askForParts(view: View): Made | undefined {
  const job = jobOf(view)
  if (job === undefined || !tries(view, may(rolesOf(view), 'part.ask'))) return undefined
  const { fields } = partRequestAsk(job.id)
  const reasons = view.entries.filter((one) => one.jobId === job.id)
  const lines = Array.from({ length: view.draw.between(1, 3) }, () => ({
    ...fields.lines[0],
    id: view.next(),
    quantity: view.draw.between(1, 3),
    condemnedBy: view.draw.chance(0.4) ? (view.draw.pick(reasons)?.id ?? null) : null,
  })) as typeof fields.lines
  const request = { ...fields, id: view.next(), askedAt: view.now(), lines }
  return { ops: [{ kind: 'partRequest.ask', fields: request }] }
}

function keepAdvice(view: View): Made | undefined {
  const job = jobOf(view)
  if (job === undefined || !tries(view, may(rolesOf(view), 'advice.keep'))) return undefined
  const fields = {
    id: view.next(),
    jobId: job.id,
    at: view.now(),
    engineVersion: '1',
    bookVersion: 1,
    inputs: { seen: ['startsThenDies'] },
    shown: { next: 'coilSwap' },
    acted: 'overridden' as const,
    chose: 'coilPrimaryResistance',
    reason: 'Meter was in hand',
  }
  return { ops: [{ kind: 'advice.keep', fields }] }
}
