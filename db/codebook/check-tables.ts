import type { CheckItem, FaultItem, SwapItem } from '@/lib/model/code-book'
import { QUANTITIES } from '@/lib/model/meter-profile'
import {
  type BookProblem,
  type Books,
  COUNTS,
  runningSums,
  TELLS,
  widestRatio,
} from './book-problem'

const isHundred = (row: readonly number[]): boolean =>
  Math.abs(row.reduce((sum, x) => sum + x, 0) - 100) < 1e-6

/** [CB6] to [CB8] [CB24] Rows that do not add up, stand in the wrong order, or tell nothing. */
export function checkTables({ shelf }: Books): BookProblem[] {
  return [
    ...shelf.check.flatMap((c) => [...rows(c), ...firstGood(c), ...order(c), ...tellsNothing(c)]),
    ...shelf.swap.flatMap((s) => [...rows(s), ...ownFaultMoves(s), ...tellsNothing(s)]),
    ...shelf.fault.flatMap(byHand),
  ]
}

/** A repair by hand does without the repair's part, and is no surer than with it. */
function byHand({ id, repair }: FaultItem): BookProblem[] {
  const { part, withoutPartOf100, successOf100 } = repair ?? {}
  if (withoutPartOf100 === undefined || successOf100 === undefined) return []
  const words =
    part === null
      ? 'can be repaired without a part, and its repair has none'
      : withoutPartOf100 > successOf100
        ? 'is cured more often without the part than with it'
        : null
  return words === null ? [] : [{ kind: 'order', id, words }]
}

const columnsOf = (item: CheckItem | SwapItem): number =>
  item.kind === 'check' ? item.outcomes.length : 3

function rows(item: CheckItem | SwapItem): BookProblem[] {
  const all: [string, readonly number[]][] = [
    ...Object.entries(item.table),
    ['otherwise', item.otherwise],
  ]
  return all.flatMap(([name, row]) => {
    if (row.length !== columnsOf(item))
      return [
        { kind: 'rows' as const, id: item.id, words: `row ${name} has ${row.length} figures` },
      ]
    if (isHundred(row)) return []
    const sum = row.reduce((total, x) => total + x, 0)
    return [{ kind: 'rows' as const, id: item.id, words: `row ${name} adds to ${sum}, not 100` }]
  })
}

function firstGood({ id, outcomes }: CheckItem): BookProblem[] {
  const right = outcomes.every((o, i) => o.good === (i === 0))
  return right
    ? []
    : [{ kind: 'order', id, words: 'the first outcome, and only it, is the good one' }]
}

function order({ id, table, otherwise }: CheckItem): BookProblem[] {
  const base = runningSums(otherwise)
  return Object.entries(table).flatMap(([fault, row]) => {
    const better = runningSums(row).some((sum, i) => sum > (base[i] ?? 100) + 1e-9)
    return better
      ? [
          {
            kind: 'order' as const,
            id,
            words: `row ${fault} is better than "otherwise": a fault cannot mend`,
          },
        ]
      : []
  })
}

function ownFaultMoves({ id, fault, table, otherwise }: SwapItem): BookProblem[] {
  const own = table[fault]?.[2] ?? 0
  const others = Object.entries(table).flatMap(([name, row]) => (name === fault ? [] : [row[2]]))
  return own > Math.max(otherwise[2], ...others)
    ? []
    : [{ kind: 'order', id, words: `"gone and back" is not likeliest with its own fault ${fault}` }]
}

function tellsNothing(item: CheckItem | SwapItem): BookProblem[] {
  const all = [...Object.values(item.table), item.otherwise]
  const tells = all.some((a, i) =>
    all.slice(i + 1).some((b) => widestRatio(item, [a, b], COUNTS.forCheck) >= TELLS),
  )
  return tells
    ? []
    : [{ kind: 'tellsNothing', id: item.id, words: `no two rows part by ${TELLS} to 1` }]
}

const VERDICTS = ['in', 'tooClose', 'outLow', 'outHigh']

/** [CB15] Numeric checks: pieces, limits, the verdicts they can have, and the figure of a spec sheet they use. */
export function checkReadings({ shelf, models }: Books): BookProblem[] {
  const values = models.flatMap((m) =>
    (m.specSheet?.components ?? []).flatMap((c) =>
      c.values.map((v) => ({ component: c.id, ...v })),
    ),
  )
  const wrongUnits = values
    .filter((v) => v.unit !== QUANTITIES[v.quantity])
    .map((v) => ({
      kind: 'reading' as const,
      id: v.id,
      words: `${v.quantity} is kept in ${QUANTITIES[v.quantity]}`,
    }))
  return [...wrongUnits, ...shelf.check.flatMap((check) => readingOf(check, values))]
}

type Value = { component: string; id: string; quantity: string }

function readingOf(check: CheckItem, values: readonly Value[]): BookProblem[] {
  const { reading } = check
  if (reading === null) return []
  const found: string[] = []
  const figure = values.find((v) => v.component === reading.component && v.id === reading.value)
  // A shop without any spec sheet yet has none to look for it on; its readings are kept without a verdict.
  if (figure === undefined && reading.fallback === null && values.length > 0)
    found.push(`no spec sheet has ${reading.component}/${reading.value}, and there is no fallback`)
  if (figure !== undefined && figure.quantity !== reading.quantity)
    found.push(`${reading.component}/${reading.value} is a ${figure.quantity}`)
  if (reading.fallback !== null && reading.fallback.unit !== QUANTITIES[reading.quantity])
    found.push(`the fallback is not in ${QUANTITIES[reading.quantity]}`)
  for (const [name, pieces] of [
    ['good', reading.good] as const,
    ...Object.entries(reading.byFault),
  ]) {
    const sum = pieces.reduce((total, p) => total + p.weight, 0)
    if (Math.abs(sum - 1) > 1e-9) found.push(`pieces of ${name} weigh ${sum}, not 1`)
    if (pieces.some((p) => p.from >= p.to)) found.push(`a piece of ${name} runs backwards`)
  }
  const ids = check.outcomes.map((o) => o.id)
  if (ids[0] !== 'in' || !ids.includes('tooClose') || ids.some((id) => !VERDICTS.includes(id)))
    found.push(`outcomes of a reading are ${VERDICTS.join(', ')}, "in" first`)
  const stray = Object.keys(reading.byFault).filter((fault) => !(fault in check.table))
  if (stray.length > 0) found.push(`reads ${stray.join(', ')} apart but its table does not`)
  return found.map((words) => ({ kind: 'reading', id: check.id, words }))
}

/** [CB16] Failure kinds: each FMI once, and no role sets more than 100 of 100 kinds. */
export function checkFailures({ shelf }: Books): BookProblem[] {
  const fmis = shelf.failure.flatMap((f) => (f.fmi === null ? [] : [f]))
  const missing = Array.from({ length: 32 }, (_, fmi) => fmi).filter(
    (fmi) => fmis.filter((f) => f.fmi === fmi).length !== 1,
  )
  const sums = new Map<string, number>()
  for (const { byRole } of fmis)
    for (const [role, of100] of Object.entries(byRole ?? {}))
      sums.set(role, (sums.get(role) ?? 0) + of100)
  return [
    ...missing.map((fmi) => ({
      kind: 'failureKinds' as const,
      id: `fmi${fmi}`,
      words: 'stands not exactly once',
    })),
    ...[...sums]
      .filter(([, sum]) => sum > 100 + 1e-9)
      .map(([role, sum]) => ({
        kind: 'failureKinds' as const,
        id: role,
        words: `faults of this role would set ${sum} kinds in 100`,
      })),
  ]
}
