/**
 * Way out (F6): refusals before arithmetic (rule R10). With any of them a limp out is not offered, whatever a
 * tow costs. Some are told by the log, the case or the belief; the rest the person says by hand. Answers are
 * data; the words are made where they are shown. The refusals follow the trade's list of what calls for a tow
 * (common practice, no source); the 11.9 V stand in battery.ts.
 */
import type { Features } from '@/lib/model/features'
import type { Id } from '@/lib/model/id'
import type { Job, WayOut } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Place } from '@/lib/model/place'
import { EMPTY_AT_VOLTS } from './battery'
import type { Suspect } from './belief'
import { type BookIndex, SOMETHING_ELSE } from './book-index'
import { living } from './case'

/** What forbids a limp out and no record tells: asked of the person each time (rule R10). */
export const SAID_BY_HAND = [
  'noBrake',
  'loose',
  'fuelLeak',
  'burntWiring',
  'fluidLost',
  'knock',
  'unfit',
] as const
/** One of them. */
export type SaidByHand = (typeof SAID_BY_HAND)[number]

/** A suspect at this chance (0 to 1) or more is likely enough for its own refusal to count (guess). */
const LIKELY = 0.25
/** The cause counts as known from this chance (0 to 1) on, or with a fix on record (guess). */
export const CAUSE_KNOWN = 0.9

/** A suspect as far as a way out asks of it. */
type Held = Pick<Suspect, 'fault' | 'name' | 'chance' | 'ruledOutBy'>

/** What a way out is judged from. What is null is not known yet, and what it would refuse is not judged. */
export type WayOutFacts = {
  job: Pick<Job, 'people' | 'before'>
  features: Features
  /** The whole job log; superseded and corrected entries are left out here. */
  entries: readonly LogEntry[]
  /** Most likely first, as the belief gives them; null while they are not worked out. */
  suspects: readonly Held[] | null
  index: BookIndex | null
  said: readonly SaidByHand[]
}

/** One reason against a limp out. */
export type LimpRefusal =
  | { kind: 'said'; what: SaidByHand }
  | { kind: 'hurt' }
  /** The last reading at rest of the suspect's battery, as typed, and the volts that count as empty. */
  | { kind: 'emptyBattery'; entryId: Id; asTyped: string; unit: string; emptyAtVolts: number }
  /** Running weak for an unknown cause: a two-stroke seizes, and so may an engine not known to be none. */
  | { kind: 'causeUnknown'; strokes: 'two' | 'notKnown' }
  /** A likely fault whose own record in the code book forbids the ride, in the book's words. */
  | { kind: 'faultForbids'; fault: string; name: string; bookWords: string }

/** Why limping out is refused (rule R10), in the order of the list above; empty when nothing speaks against it. */
export function limpRefusals(facts: WayOutFacts): LimpRefusal[] {
  const entries = living(facts.entries)
  const fixed = entries.some(({ body }) => body.kind === 'fix')
  const hurt = facts.job.people.hurt && !facts.said.includes('unfit')
  return [
    ...facts.said.map((what) => ({ kind: 'said', what }) as const),
    ...(hurt ? [{ kind: 'hurt' } as const] : []),
    ...emptyBattery(entries, facts.index),
    ...(fixed ? [] : [...unknownCause(facts), ...forbiddingFaults(facts)]),
  ]
}

/** A reason against a limp out that could not be looked into. */
export type LimpUnjudged = 'battery' | 'cause' | 'faults'

/**
 * What the refusals could not judge, in their order: without the code book no battery reading and no fault's
 * own record, without the belief neither the cause nor what is likely. A limp out is offered only when this
 * and the refusals are empty, for what is not known refuses nothing (rule R10). With a fix on record cause
 * and faults are not asked.
 */
export function limpUnjudged({ entries, index, suspects }: WayOutFacts): LimpUnjudged[] {
  const fixed = living(entries).some(({ body }) => body.kind === 'fix')
  return [
    ...(index === null ? (['battery'] as const) : []),
    ...(!fixed && suspects === null ? (['cause'] as const) : []),
    ...(!fixed && (suspects === null || index === null) ? (['faults'] as const) : []),
  ]
}

function emptyBattery(entries: readonly LogEntry[], index: BookIndex | null): LimpRefusal[] {
  const last = entries.findLast(
    ({ body }) =>
      body.kind === 'reading' &&
      body.subject === 'suspect' &&
      index?.checks.get(body.checkId)?.reading?.value === 'restVolts',
  )
  if (last?.body.kind !== 'reading' || last.body.value > EMPTY_AT_VOLTS) return []
  const { asTyped, unit } = last.body
  const battery = { entryId: last.id, asTyped, unit, emptyAtVolts: EMPTY_AT_VOLTS }
  return [{ kind: 'emptyBattery', ...battery }]
}

const open = (suspects: readonly Held[] | null) =>
  (suspects ?? []).filter((one) => one.ruledOutBy === null)

function unknownCause({ features, suspects }: WayOutFacts): LimpRefusal[] {
  if (suspects === null) return []
  const top = open(suspects)[0]
  const known = top !== undefined && top.fault !== SOMETHING_ELSE && top.chance >= CAUSE_KNOWN
  if (known || features.strokes === 'four') return []
  return [{ kind: 'causeUnknown', strokes: features.strokes === 'two' ? 'two' : 'notKnown' }]
}

function forbiddingFaults({ suspects, index }: WayOutFacts): LimpRefusal[] {
  return open(suspects)
    .filter((one) => one.chance >= LIKELY)
    .flatMap(({ fault, name }) => {
      const bookWords = index?.faults.get(fault)?.limpRefused ?? null
      return bookWords === null ? [] : [{ kind: 'faultForbids', fault, name, bookWords } as const]
    })
}

/**
 * What is not yet there for a way out, said beside its key; it refuses nothing. `noFix`, `noProofRun` and
 * `faultInProofRun` stand against "repair here" (F6, F7). `examineFirst`: water or a rollover went before,
 * and a machine not examined after it is on hold (rule R3).
 */
export type WayOutNotice = 'noFix' | 'noProofRun' | 'faultInProofRun' | 'examineFirst'

/** The notices of one way out, in the order they are said; empty when there is nothing to say. */
export function wayOutNotices(
  way: WayOut,
  { job, entries }: Pick<WayOutFacts, 'job' | 'entries'>,
): WayOutNotice[] {
  const gone = job.before.includes('water') || job.before.includes('rollover')
  return [
    ...(way === 'repairHere' ? repairNotices(living(entries)) : []),
    ...(gone ? (['examineFirst'] as const) : []),
  ]
}

function repairNotices(entries: readonly LogEntry[]): WayOutNotice[] {
  const fixed = entries.some(({ body }) => body.kind === 'fix')
  const run = entries.findLast(({ body }) => body.kind === 'proofRun')?.body
  const seen = run?.kind === 'proofRun' && run.faults > 0
  return [
    ...(fixed ? [] : (['noFix'] as const)),
    ...(run === undefined ? (['noProofRun'] as const) : []),
    ...(seen ? (['faultInProofRun'] as const) : []),
  ]
}

type Decided = LogEntry & { body: Extract<LogEntry['body'], { kind: 'wayOut' }> }
const isDecided = (entry: LogEntry): entry is Decided => entry.body.kind === 'wayOut'

/** The way out that stands: the last living decision of a log, undefined when none does (rules R2, R8). */
export const decidedWayOut = (entries: readonly LogEntry[]): Decided | undefined =>
  living(entries).filter(isDecided).at(-1)

/**
 * What a log lacks before its machine may stand as left behind (rule R2), the first of: a position on the
 * job, a living photo, a living way out that leaves the machine, whose reasons tell key, tap, how secured,
 * whose land and the day to fetch it. Null when all is there.
 */
export function leavingLacks(of: {
  place: Place | null
  entries: readonly LogEntry[]
}): 'place' | 'photo' | 'wayOut' | null {
  if (of.place === null) return 'place'
  if (!living(of.entries).some(({ body }) => body.kind === 'photo')) return 'photo'
  return decidedWayOut(of.entries)?.body.machineState === 'leftBehind' ? null : 'wayOut'
}
