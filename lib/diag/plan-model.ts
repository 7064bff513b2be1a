/**
 * The bridge from belief to plan (rule R5): each suspect as "only this one is wrong", and one lump "two or
 * more, or something else" that no repair mends, so that the plan never counts on the list being whole. The
 * rows of the lump are what is left of each outcome's chance when the single faults are taken out.
 */
import type { CheckItem, FaultItem, SwapItem } from '@/lib/model/code-book'
import type { LogBody } from '@/lib/model/log-entry'
import { type ActionTable, checkTable, swapTable } from './action-table'
import { type Reckoning, reckon } from './belief'
import { SOMETHING_ELSE } from './book-index'
import type { Case } from './case'
import { type Sight, sightOf } from './evidence-table'
import { letsThrough } from './gate'
import { type Outcome, outlookOf } from './outlook'
import {
  isHeld,
  type Kind,
  type LeftOut,
  type Means,
  minutesHere,
  whyNotCheck,
  whyNotNow,
  whyNotRepair,
  whyNotSwap,
} from './plan-means'
import { openSetups, setupsFor } from './plan-setups'
import { stopsOf } from './plan-stops'
import { opening, openOf, problemOf } from './search-problem'
import type { SearchState, SingleModel } from './troubleshoot-model'
import { fitnessFor } from './verdict-table'

/** The lump's id in the model. */
export const LUMP = 'twoOrMoreOrSomethingElse'
/** Minutes of the test run after a repair (common practice, no source). */
export const TEST_RUN_MINUTES = 5
/** A repair that cannot be done is only listed for suspects from this chance on. */
const WORTH_NAMING = 0.02

/** The planner's model of a case and where it stands, with what is not in it. */
export type PlanModel = {
  model: SingleModel
  state: SearchState
  leftOut: LeftOut[]
  reckoning: Reckoning
  /** Outlooks of everything in the model, by `check:id` and `swap:id`. */
  outlooks: ReadonlyMap<string, Outcome[]>
}

type Doing = { c: Case; means: Means; sight: Sight; reckoning: Reckoning; leftOut: LeftOut[] }

/** The planner's model of a case with these means, and everything that was left out of it with the reason. */
export function planModel(c: Case, means: Means): PlanModel {
  const reckoning = reckon(c)
  const sight = sightOf(c, reckoning.suspects)
  const doing: Doing = { c, means, sight, reckoning, leftOut: [] }
  const outlooks = new Map<string, Outcome[]>()
  const checks = [...checksOf(doing, outlooks), ...swapsOf(doing, outlooks)]
  const faults = faultsOf(doing)
  const stops = stopsOf(c, means, reckoning)
  doing.leftOut.push(...stops.leftOut)
  const minutes = means.minutesToLeaveBy
  const setups = setupsFor(c, {
    used: [...checks, ...repairsIn(faults)].flatMap(({ setup }) => setup),
    means,
  })
  const listed = new Set(setups.map(({ id }) => id))
  const model: SingleModel = {
    kind: 'single',
    ratePerMinute: means.shop.perMinuteMinor,
    faults,
    parts: {
      onHand: means.bag?.parts.filter((p) => p.quantity > 0).map((p) => p.part) ?? allParts(doing),
    },
    checks,
    setups,
    verify: { cost: 0, minutes: minutesHere(TEST_RUN_MINUTES, means) },
    stops: stops.stops,
    ...(minutes === null ? {} : { daylight: { minutes: Math.max(0, minutes) } }),
  }
  const state = {
    evidence: {},
    tried: [],
    open: openSetups(c).filter((id) => listed.has(id)),
    elapsed: 0,
  }
  return { model, state, leftOut: tooLate(model, state, doing), reckoning, outlooks }
}

/** Faults named by a fix entry so far. */
export function fixedFaults({ entries }: Case): string[] {
  return entries.flatMap(({ body }) => (body.kind === 'fix' ? [body.fault] : []))
}

function checksOf(doing: Doing, outlooks: Map<string, Outcome[]>): SingleModel['checks'] {
  const { c, means } = doing
  return [...c.index.checks.values()].flatMap((check) => {
    if (!letsThrough(check.gate, c.features)) return []
    const table = checkTable(doing.sight, check)
    if (table.scope.length === 0) return []
    const why =
      recorded(doing.sight, check) ?? whyNotNow(c, check) ?? whyNotCheck(c.index, check, means)
    const action = {
      id: check.id,
      cost: check.costMinor,
      minutes: check.minutes,
      setup: check.setups,
    }
    const built =
      why ??
      enter(doing, outlooks, { kind: 'check', action, table, cannot: () => cannotDecide(c, check) })
    return list(doing, { id: check.id, kind: 'check' }, built)
  })
}

function swapsOf(doing: Doing, outlooks: Map<string, Outcome[]>): SingleModel['checks'] {
  const { c, means } = doing
  return [...c.index.swaps.values()].flatMap((swap: SwapItem) => {
    const isSuspect = doing.reckoning.suspects.some((s) => s.fault === swap.fault)
    if (!isSuspect || !letsThrough(swap.gate, c.features)) return []
    const table = swapTable(doing.sight, swap)
    const why = table === null ? 'Done.' : whyNotSwap(c.index, swap, means)
    const action = { id: swap.id, cost: 0, minutes: swap.minutes, setup: swap.setups }
    const built =
      why ?? (table === null ? 'Done.' : enter(doing, outlooks, { kind: 'swap', action, table }))
    return list(doing, { id: swap.id, kind: 'swap' }, built)
  })
}

type Entry = SingleModel['checks'][number]

/** The model's entry, or the sentence that keeps it out. */
function enter(
  { means, reckoning }: Doing,
  outlooks: Map<string, Outcome[]>,
  given: {
    kind: 'check' | 'swap'
    action: { id: string; cost: number; minutes: number; setup: readonly string[] }
    table: ActionTable
    cannot?: () => string | null
  },
): Entry | string {
  const { action, table, kind } = given
  const cannot = given.cannot?.() ?? null
  if (cannot !== null) return cannot
  const { outcomes, saysNothing } = outlookOf(reckoning, table)
  if (outcomes.length === 0) return 'Cannot be summed with everything that was recorded.'
  if (saysNothing) return 'Says nothing here: no outcome moves a suspect by 3 of 100.'
  outlooks.set(`${kind}:${action.id}`, outcomes)
  return {
    ...action,
    minutes: minutesHere(action.minutes, means),
    outcomes: table.outcomes.map((o) => o.id),
    p: rowsOf(reckoning, { table, outcomes }),
  }
}

function list(doing: Doing, what: { id: string; kind: Kind }, built: Entry | string): Entry[] {
  if (typeof built !== 'string') return [built]
  doing.leftOut.push({ ...what, reason: built })
  return []
}

/** Chances of each outcome for every single fault, and for the lump by what they leave. */
function rowsOf(
  { suspects, last }: Reckoning,
  { table, outcomes }: { table: ActionTable; outcomes: readonly Outcome[] },
): Record<string, number[]> {
  const rows: Record<string, number[]> = {}
  const rest = outcomes.map((o) => o.probability)
  suspects.forEach((s, f) => {
    if (s.fault === SOMETHING_ELSE) return
    const row = table.chances(table.scope.includes(f) ? [f] : [])
    rows[s.fault] = row
    row.forEach((p, k) => {
      rest[k] = (rest[k] ?? 0) - p * (last.only[f] ?? 0)
    })
  })
  const held = rest.map((x) => Math.max(0, x))
  const sum = held.reduce((total, x) => total + x, 0)
  rows[LUMP] = sum > 1e-12 ? held.map((x) => x / sum) : table.chances([])
  return rows
}

function faultsOf(doing: Doing): SingleModel['faults'] {
  const { c, means, reckoning } = doing
  const fixed = fixedFaults(c)
  let lump = 1
  const faults = reckoning.suspects.flatMap((s, f) => {
    const item = c.index.faults.get(s.fault)
    if (s.fault === SOMETHING_ELSE || item === undefined) return []
    const only = reckoning.last.only[f] ?? 0
    lump -= only
    const why = fixed.includes(s.fault) ? 'Done already.' : whyNotRepair(c.index, item, means)
    if (why !== null && (reckoning.last.marginals[f] ?? 0) >= WORTH_NAMING)
      doing.leftOut.push({ id: s.fault, kind: 'repair', reason: why })
    return [{ id: s.fault, prior: only, repair: why === null ? repairOf(doing, item) : null }]
  })
  return [...faults, { id: LUMP, prior: Math.max(1e-9, lump), repair: null }]
}

/** A repair at its price: the book's own, and the part's from the spec sheet; by hand where the part is not there. */
function repairOf(
  { c, means }: Doing,
  { repair }: FaultItem,
): SingleModel['faults'][number]['repair'] {
  if (repair === null) return null
  const { part, withoutPartOf100, successOf100 } = repair
  const byHand = withoutPartOf100 !== undefined && part !== null && !isHeld(part, means)
  const needsPart = byHand ? null : part
  const price = c.spec?.parts.find((p) => p.part === needsPart)?.genuineMinor ?? 0
  return {
    cost: repair.costMinor + price,
    minutes: minutesHere(repair.minutes, means),
    setup: repair.setups,
    success: (byHand ? withoutPartOf100 : successOf100) / 100,
    ...(needsPart === null ? {} : { needsPart }),
  }
}

/**
 * Why a check is not offered again; null when it is open. What was seen before a fix of something the check looks
 * at speaks of the old part (docs/spec/diag.md, E4): such a check is offered once more.
 */
function recorded({ c: { entries }, log }: Sight, check: CheckItem): string | null {
  const at = entries.findLastIndex(({ body }) => isOf(body, check))
  const body = entries[at]?.body
  if (body === undefined) return null
  if (body.kind === 'couldNot') return `Could not be done: ${body.reason}`
  const looksAt = [...Object.keys(check.table), ...Object.keys(check.reading?.byFault ?? {})]
  return looksAt.some((fault) => (log.fixes.get(fault)?.at(-1) ?? -1) > at) ? null : 'Done.'
}

/** Whether an entry is of this check; a reading of the good twin alone leaves the suspect still to be read. */
const isOf = (body: LogBody, check: CheckItem): boolean =>
  (body.kind === 'check' ||
    body.kind === 'couldNot' ||
    (body.kind === 'reading' && body.subject === 'suspect')) &&
  body.checkId === check.id

function cannotDecide(c: Case, check: CheckItem): string | null {
  const fitness = fitnessFor(c, check)
  return fitness === null || fitness.decides ? null : fitness.words
}

const allParts = ({ c }: Doing): string[] =>
  [...c.index.faults.values()].flatMap((f) => (f.repair?.part == null ? [] : [f.repair.part]))

const repairsIn = (faults: SingleModel['faults']) => faults.flatMap(({ repair }) => repair ?? [])

/** What no longer fits before the leave-by time, set-ups and test run included, with how far it is over (rule R6). */
function tooLate(model: SingleModel, state: SearchState, { c, leftOut }: Doing): LeftOut[] {
  const problem = problemOf(model)
  if (!Number.isFinite(problem.daylight)) return leftOut
  const open = openOf(model, state)
  type Timed = { id: string; minutes: number; setups: number }
  const late = ({ id, minutes, setups }: Timed, kind: Kind): LeftOut[] => {
    const over = minutes + opening(problem, setups, open).minutes - problem.daylight
    return over > 1e-9
      ? [{ id, kind, reason: `${Math.ceil(over)} min over the leave-by time.` }]
      : []
  }
  const worthNaming = new Set(model.faults.filter((f) => f.prior >= WORTH_NAMING).map((f) => f.id))
  return [
    ...leftOut,
    ...problem.checks.flatMap((one) => late(one, c.index.swaps.has(one.id) ? 'swap' : 'check')),
    ...problem.repairs.flatMap((one) => (worthNaming.has(one.id) ? late(one, 'repair') : [])),
  ]
}
