import type { Suspect } from '@/lib/diag/belief'
import type { BookIndex } from '@/lib/diag/book-index'
import { SOMETHING_ELSE } from '@/lib/diag/book-index'
import { living } from '@/lib/diag/case'
import type { Features } from '@/lib/model/features'
import type { Job, WayOut } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'

/**
 * Refusals before arithmetic (rule R10): with any of these a limp out is not offered, whatever a tow
 * costs. Those that the log tells are found here; the rest the person says by hand.
 */
export const SAID_BY_HAND = [
  'noBrake',
  'loose',
  'fuelLeak',
  'burntWiring',
  'fluidLost',
  'knock',
  'unfit',
] as const
export type SaidByHand = (typeof SAID_BY_HAND)[number]

export const SAID_WORDS: Record<SaidByHand, string> = {
  noBrake: 'No working brake',
  loose: 'Steering or suspension part loose',
  fuelLeak: 'Fuel leak',
  burntWiring: 'Burnt wiring',
  fluidLost: 'Coolant or oil lost',
  knock: 'Knock or metal noise',
  unfit: 'Rider not fit to ride',
}

/** At or below this a battery counts as empty, in volts (rule R10; table of facts/CHECKS.md 2.6). */
const EMPTY_VOLTS = 11.9
/** A suspect at this chance or more is likely enough for its own refusal to count. */
const LIKELY = 0.25
/** The cause counts as known from here on, or with a fix on record. */
const KNOWN = 0.9

export type WayOutFacts = {
  job: Pick<Job, 'people' | 'before'>
  features: Features
  entries: readonly LogEntry[]
  suspects: readonly Suspect[]
  index: BookIndex | null
  said: readonly SaidByHand[]
}

/** Why limping out is refused; empty when nothing speaks against it. */
export function limpRefusals(facts: WayOutFacts): string[] {
  const entries = living(facts.entries)
  const fixed = entries.some(({ body }) => body.kind === 'fix')
  return [
    ...facts.said.map((one) => `${SAID_WORDS[one]}.`),
    ...(facts.job.people.hurt && !facts.said.includes('unfit') ? ['Somebody is hurt.'] : []),
    ...emptyBattery(entries, facts.index),
    ...(fixed ? [] : causeRefusals(facts)),
  ]
}

function causeRefusals({ features, suspects, index }: WayOutFacts): string[] {
  const open = suspects.filter((one) => one.ruledOutBy === null)
  const top = open[0]
  const known = top !== undefined && top.fault !== SOMETHING_ELSE && top.chance >= KNOWN
  const unknown =
    features.strokes !== 'four' && !known
      ? [
          features.strokes === 'two'
            ? 'Cause not known on a two-stroke: running weak it seizes.'
            : 'Cause not known, and it is not on record that this is a four-stroke.',
        ]
      : []
  const byFault = open
    .filter((one) => one.chance >= LIKELY)
    .flatMap((one) => {
      const words = index?.faults.get(one.fault)?.limpRefused ?? null
      return words === null ? [] : [`${one.name}: ${words}`]
    })
  return [...unknown, ...byFault]
}

function emptyBattery(entries: readonly LogEntry[], index: BookIndex | null): string[] {
  const last = entries.findLast(
    ({ body }) =>
      body.kind === 'reading' &&
      body.subject === 'suspect' &&
      index?.checks.get(body.checkId)?.reading?.value === 'restVolts',
  )
  if (last?.body.kind !== 'reading' || last.body.value > EMPTY_VOLTS) return []
  return [
    `Battery empty: ${last.body.asTyped} ${last.body.unit} at rest, ${EMPTY_VOLTS} or less counts as empty.`,
  ]
}

/** What is not yet there for a way out, said beside its key; these do not refuse it. */
export function notices(way: WayOut, facts: WayOutFacts): string[] {
  const entries = living(facts.entries)
  const has = (kind: LogEntry['body']['kind']) => entries.some(({ body }) => body.kind === kind)
  const run = entries.findLast(({ body }) => body.kind === 'proofRun')
  const list: string[] = []
  if (way === 'repairHere') {
    if (!has('fix')) list.push('No fix is on record.')
    if (run === undefined) list.push('No proof run is on record.')
    else if (run.body.kind === 'proofRun' && run.body.faults > 0)
      list.push('The fault came in the last proof run: the repair is not proved.')
  }
  if (facts.job.before.includes('water') || facts.job.before.includes('rollover'))
    list.push('Water or a rollover went before: have it examined before it is ridden again.')
  return list
}
