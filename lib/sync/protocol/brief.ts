import { assertNever } from '@/lib/model/result'
import type { OwnRun, PullRow, SyncResponse } from './message'
import type { Op } from './op'
import { fullRow } from './short'

/**
 * The short form of an answer, for a phone that asked for it: what the phone has just sent is not said
 * again word by word. Numbers of settled ops come as `[first, last]`, and rows of entries that this very
 * request added as runs of what the shop made of them: change number, place in the job's chain, and when
 * they came; ops of the request and other rows leave out what is said beside them (short.ts). The shop folds,
 * the phone unfolds with its ops at hand; nothing past it knows of the short form.
 */

/** Whole numbers in rising order as `[first, last]` each. */
export function runsOf(numbers: readonly number[]): [number, number][] {
  const runs: [number, number][] = []
  for (const number of [...numbers].sort((a, b) => a - b)) {
    const last = runs.at(-1)
    if (last !== undefined && number === last[1] + 1) last[1] = number
    else if (number !== last?.[1]) runs.push([number, number])
  }
  return runs
}

/** One own entry, before it joins a run. */
export type OwnEntry = Omit<OwnRun, 'count'>

/** Own entries in change order as runs: op number, change number and place rise by one from each to the next. */
export function ownRuns(entries: readonly OwnEntry[]): OwnRun[] {
  const runs: OwnRun[] = []
  for (const entry of entries) {
    const last = runs.at(-1)
    if (last !== undefined && follows(last, entry)) last.count += 1
    else runs.push({ ...entry, count: 1 })
  }
  return runs
}

const follows = (run: OwnRun, { dseq, seq, order, receivedAt }: OwnEntry): boolean =>
  dseq === run.dseq + run.count &&
  seq === run.seq + run.count &&
  order === run.order + run.count &&
  receivedAt === run.receivedAt

/**
 * The answer in its long form. `sent` are the ops of the request. Undefined when the answer speaks of
 * numbers that were not sent: then it is no answer to this request.
 */
export function unfolded(response: SyncResponse, sent: readonly Op[]): SyncResponse | undefined {
  const ops = new Map(sent.map((op) => [op.dseq, op]))
  const numbers = (response.takenNumbers ?? []).flatMap(([first, last]) => upTo(first, last))
  const taken = numbers.map((number) => ops.get(number)?.id)
  const pull = unfoldedPull(response.pull, ops)
  if (pull === undefined || taken.includes(undefined)) return undefined
  const ids = taken.flatMap((id) => id ?? [])
  return { ...response, taken: [...response.taken, ...ids], takenNumbers: [], pull }
}

/** A request has 500 ops at most: a longer run is nonsense, and one number too many says so. */
const upTo = (first: number, last: number): number[] =>
  Array.from({ length: Math.max(0, Math.min(last - first + 1, 501)) }, (_, index) => first + index)

function unfoldedPull(
  pull: SyncResponse['pull'],
  ops: ReadonlyMap<number, Op>,
): SyncResponse['pull'] | undefined {
  switch (pull.kind) {
    case 'reset':
    case 'signIn':
    case 'notAsked':
      return pull
    case 'page': {
      const own = (pull.own ?? []).flatMap((run) =>
        upTo(0, run.count - 1).map((index) => ownRow(run, index, ops)),
      )
      if (own.includes(undefined)) return undefined
      const rows = [...pull.rows.map(fullRow), ...own.flatMap((row) => row ?? [])]
      return { ...pull, own: [], rows: rows.sort((a, b) => a.seq - b.seq) }
    }
    default:
      return assertNever(pull)
  }
}

function ownRow(run: OwnRun, index: number, ops: ReadonlyMap<number, Op>): PullRow | undefined {
  const op = ops.get(run.dseq + index)
  if (op?.kind !== 'log.add') return undefined
  const { id, jobId } = op.fields
  const row = { ...op.fields, receivedAt: run.receivedAt, order: run.order + index }
  return { seq: run.seq + index, entity: 'logEntry', id, jobId, state: 'present', row, own: true }
}
