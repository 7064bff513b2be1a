/**
 * What a proof run after a fix says. A fault that was fixed stays away with its repair's chance of success; one
 * that was not shows itself in half of the starts and in 5 of 100 minutes (guess), yet never less than 1 in 20
 * slips through. So a clean run speaks for the fixed fault and against every other; a run with the fault in it
 * speaks against the fixed one. Runs after the same fixes add up and count once; a cold run of a fault that
 * comes when hot, and a run before any fix, say nothing.
 */
import type { LogEntry } from '@/lib/model/log-entry'
import { fixesBefore } from './evidence-log'
import { type Evidence, nothing, type Sight, successOf } from './evidence-table'
import type { Factor } from './factor'
import { productMachine, seenMachine } from './machine'

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

/** The evidence of a proof run; it is carried by the last run after the same fixes that counts. */
export function runEvidence(
  sight: Sight,
  entry: LogEntry,
  { body, at }: { body: RunBody; at: number },
): Evidence {
  const label = `Proof run: ${body.starts} starts, ${body.minutes} min, fault seen ${body.faults} times`
  const quiet = nothing(entry, 'proofRun', label)
  const fixAt = sight.log.lastFix[at] ?? -1
  if (fixAt < 0) return quiet
  const runs = sight.log.runs.get(fixAt)
  if (runs === undefined) return quiet
  const { last, starts, minutes, seen } = runs
  if (last !== entry.id || (starts === 0 && minutes === 0)) return quiet
  const slips = chanceUnseen(starts, minutes)
  const stays = new Map(
    sight.suspects.map(({ fault }, f) => {
      const isFixed = fixesBefore(sight.log, fault, at) > 0
      return [f, isFixed ? successOf(sight.c, fault) : slips]
    }),
  )
  return { ...quiet, factor: runFactor(stays, seen) }
}

/** Clean: prod of stays over the present. Not clean: 1 - (1 - stray) times that, the noisy-OR of "seen". */
function runFactor(stays: ReadonlyMap<number, number>, seen: boolean): Factor {
  const clean = (present: readonly number[]) =>
    present.reduce((product, f) => product * (stays.get(f) ?? 1), 1)
  return {
    scope: [...stays.keys()],
    at: (present) => (seen ? 1 - (1 - STRAY) * clean(present) : clean(present)),
    machine: seen
      ? seenMachine(STRAY, new Map([...stays].map(([f, stay]) => [f, 1 - stay])))
      : productMachine(stays),
  }
}
