/**
 * The job log laid out for evidence in one pass, so that ten thousand entries take ten times as long as a thousand:
 * which fixes came before an entry, the good twins, the steps of each swap, the runs after each fix.
 */
import type { LogBody, ReadingBody } from '@/lib/model/log-entry'
import type { Case } from './case'
import { ALL_OPEN, type SwapWeights, swapWeights } from './swap-weights'

type RunBody = Extract<LogBody, { kind: 'proofRun' }>

/** The log as evidence needs it; every place is an index into the log, the oldest entry at 0. */
export type EvidenceLog = {
  /** Where each fault was fixed, as places in the log, rising. */
  fixes: ReadonlyMap<string, readonly number[]>
  /** The newest reading of a good twin by check and quantity, see `twinKey`. */
  twins: ReadonlyMap<string, ReadingBody>
  /** What the outcome of a swap was narrowed to by each of its steps, by the step's entry. */
  swapSteps: ReadonlyMap<string, { now: SwapWeights; moves: boolean }>
  /** Proof runs that count, added up, by the place of the fix before them. */
  runs: ReadonlyMap<number, CountedRuns>
  /** The place of the last fix before each entry, -1 before the first. */
  lastFix: readonly number[]
}

/** `last` is the entry of the last one. */
export type CountedRuns = { last: string; starts: number; minutes: number; seen: boolean }

/** What twins are found by. */
export const twinKey = ({ checkId, quantity }: Pick<ReadingBody, 'checkId' | 'quantity'>): string =>
  `${quantity} ${checkId}`

/** The entries of a case, laid out. */
export function evidenceLog(c: Pick<Case, 'entries' | 'symptom'>): EvidenceLog {
  const fixes = new Map<string, number[]>()
  const twins = new Map<string, ReadingBody>()
  const swaps = new Map<string, SwapWeights | null>()
  const swapSteps = new Map<string, { now: SwapWeights; moves: boolean }>()
  const runs = new Map<number, CountedRuns>()
  const lastFix: number[] = []
  const onlyHot = comesWhenHot(c)
  let fixAt = -1
  c.entries.forEach((entry, at) => {
    const { body } = entry
    lastFix.push(fixAt)
    if (body.kind === 'fix') {
      push(fixes, body.fault, at)
      fixAt = at
    } else if (body.kind === 'reading' && body.subject === 'knownGood')
      twins.set(twinKey(body), body)
    else if (body.kind === 'swap') {
      const before = swaps.get(body.swapId) ?? null
      const now = swapWeights([body], before)
      swaps.set(body.swapId, now)
      const moves = (now ?? ALL_OPEN).some((w, k) => w !== (before ?? ALL_OPEN)[k])
      swapSteps.set(entry.id, { now: now ?? ALL_OPEN, moves })
    } else if (body.kind === 'proofRun' && (body.hot || !onlyHot))
      runs.set(fixAt, withRun(runs.get(fixAt), entry.id, body))
  })
  return { fixes, twins, swapSteps, runs, lastFix }
}

const withRun = (before: CountedRuns | undefined, last: string, run: RunBody): CountedRuns => ({
  last,
  starts: (before?.starts ?? 0) + run.starts,
  minutes: (before?.minutes ?? 0) + run.minutes,
  seen: before?.seen === true || run.faults > 0,
})

/** Whether the complaint was taken down as one that comes when hot: then only hot runs count. */
function comesWhenHot({ entries, symptom }: Pick<Case, 'entries' | 'symptom'>): boolean {
  return entries.some(
    ({ body }) =>
      body.kind === 'symptom' &&
      body.symptom === symptom &&
      body.conditions.some((id) => /hot/i.test(id)),
  )
}

/** How often a fault was fixed before a place in the log. */
export function fixesBefore({ fixes }: EvidenceLog, fault: string, at: number): number {
  const places = fixes.get(fault) ?? []
  let [low, high] = [0, places.length]
  while (low < high) {
    const middle = (low + high) >> 1
    if ((places[middle] ?? 0) < at) low = middle + 1
    else high = middle
  }
  return low
}

function push<K, V>(map: Map<K, V[]>, key: K, value: V): void {
  const list = map.get(key)
  if (list === undefined) map.set(key, [value])
  else list.push(value)
}
