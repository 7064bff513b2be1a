/**
 * What a proof run after a fix says. A fault that was fixed stays away with its repair's chance of success; one
 * that was not shows itself in half of the starts and in 5 of 100 minutes (guess), yet never less than 1 in 20
 * slips through. So a clean run speaks for the fixed fault and against every other; a run with the fault in it
 * speaks against the fixed one. Runs after the same fixes add up and count once; a cold run of a fault that
 * comes when hot, and a run before any fix, say nothing.
 */
import type { LogEntry } from '@/lib/model/log-entry'
import type { Case } from './case'
import { type Evidence, type Multipliers, nothing, type Sight } from './evidence-table'

type RunBody = Extract<LogEntry['body'], { kind: 'proofRun' }>

const UNSEEN_PER_START = 0.5
const SEEN_PER_MINUTE = 0.05
const SLIPS_THROUGH = 0.05
/** A fault seen in a run though nothing is left: a slip of the hand (guess). */
const STRAY = 0.01

/** Chance that a fault which is still there does not show in this many starts and minutes (guess). */
export function chanceUnseen(starts: number, minutes: number): number {
  const unseen = UNSEEN_PER_START ** starts * Math.exp(-SEEN_PER_MINUTE * minutes)
  return Math.max(SLIPS_THROUGH, unseen)
}

/** The evidence of a proof run; it is carried by the last run after the same fixes. */
export function runEvidence(
  sight: Sight,
  entry: LogEntry,
  { body, at }: { body: RunBody; at: number },
): Evidence {
  const label = `Proof run: ${body.starts} starts, ${body.minutes} min, fault seen ${body.faults} times`
  const quiet = nothing(entry, 'proofRun', label)
  const fixes = fixesBefore(sight.c, at)
  if (fixes.size === 0 || (comesWhenHot(sight.c) && !body.hot)) return quiet
  const runs = runsOfSameFixes(sight.c, at)
  if (runs.at(-1) !== body) return quiet
  const starts = runs.reduce((sum, r) => sum + r.starts, 0)
  const minutes = runs.reduce((sum, r) => sum + r.minutes, 0)
  if (starts === 0 && minutes === 0) return quiet
  const seen = runs.some((r) => r.faults > 0)
  const slips = chanceUnseen(starts, minutes)
  const away = (suspect: number): number => {
    const fault = sight.suspects[suspect]?.fault ?? ''
    return fixes.has(fault) ? successOf(sight.c, fault) : slips
  }
  return { ...quiet, multipliers: seen ? notClean(away) : [{ weight: 1, of: away }] }
}

/** 1 - (1 - stray) prod(away): the noisy-OR of "seen", as a sum of two products. */
const notClean = (away: (suspect: number) => number): Multipliers => [
  { weight: 1, of: () => 1 },
  { weight: STRAY - 1, of: away },
]

const successOf = ({ index }: Case, fault: string): number =>
  (index.faults.get(fault)?.repair?.successOf100 ?? 90) / 100

function fixesBefore({ entries }: Case, at: number): Set<string> {
  const fixes = new Set<string>()
  for (const { body } of entries.slice(0, at)) if (body.kind === 'fix') fixes.add(body.fault)
  return fixes
}

function runsOfSameFixes({ entries }: Case, at: number): RunBody[] {
  const from = entries.slice(0, at).findLastIndex((e) => e.body.kind === 'fix')
  const runs: RunBody[] = []
  for (const { body } of entries.slice(from + 1)) {
    if (body.kind === 'fix') break
    if (body.kind === 'proofRun') runs.push(body)
  }
  return runs
}

function comesWhenHot({ entries, symptom }: Case): boolean {
  return entries.some(
    ({ body }) =>
      body.kind === 'symptom' &&
      body.symptom === symptom &&
      body.conditions.some((id) => /hot/i.test(id)),
  )
}
