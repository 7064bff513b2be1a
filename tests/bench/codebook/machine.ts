// A stranded machine drawn from the code book, or from a book whose figures are off: it answers any check.
import type { BookIndex } from '@/lib/diag/book-index'
import { buildCase } from '@/lib/diag/case'
import { letsThrough } from '@/lib/diag/gate'
import { candidates } from '@/lib/diag/priors'
import type { CodeBookItem, SymptomItem } from '@/lib/model/code-book'
import type { Features } from '@/lib/model/features'
import type { LogBody } from '@/lib/model/log-entry'
import { pick } from './random'

/** What is wrong with one machine: one fault, two, or something that is not in the book (an empty list). */
export type Machine = {
  symptom: string
  /** All of it is true of the machine; the engine may be told less. */
  features: Features
  faults: readonly string[]
  conditions: readonly string[]
}

/** Of which complaint on which kind of machine. */
export type Given = { index: BookIndex; symptom: string; features: Features }

/** A machine as the book says they come, under one symptom. */
export function drawMachine(of: Given, random: () => number): Machine {
  const { index, symptom, features } = of
  const list = candidates(
    buildCase({
      index,
      features,
      spec: null,
      job: { complaint: { words: '', symptom, lampOn: null } },
      entries: [],
    }),
  )
  const draw = (): string | null => {
    const at = pick(
      list.map((one) => one.of100),
      random,
    )
    const fault = list[at]?.fault ?? null
    return fault !== null && index.faults.has(fault) ? fault : null
  }
  const item = index.symptoms.get(symptom)
  const two = random() * 100 < (item?.twoWrongOf100 ?? 0)
  const drawn = two ? [draw(), draw()] : [draw()]
  const faults = [...new Set(drawn.filter((fault) => fault !== null))]
  return { symptom, features, faults, conditions: saidOf(item?.conditions ?? [], faults, random) }
}

/** What a rider says of it: of the answers to one question one at most, the rest each for itself. */
function saidOf(
  conditions: SymptomItem['conditions'],
  faults: readonly string[],
  random: () => number,
): string[] {
  const said = ({ tells }: SymptomItem['conditions'][number]): number => {
    const rows = faults.map((fault) => tells?.of100[fault] ?? tells?.otherwise ?? 0)
    return Math.max(...(rows.length === 0 ? [tells?.otherwise ?? 0] : rows))
  }
  const questions = new Set(conditions.map((c) => c.answers ?? c.id))
  return [...questions].flatMap((question) => {
    const answers = conditions.filter((c) => (c.answers ?? c.id) === question)
    const weights = answers.map(said)
    const silent = Math.max(0, 100 - weights.reduce((a, b) => a + b, 0))
    return answers[pick([...weights, silent], random)]?.id ?? []
  })
}

/** How a check on this machine ends: the worst that any of its faults makes of it. */
export function endOfCheck(
  index: BookIndex,
  { machine, checkId }: { machine: Machine; checkId: string },
  random: () => number,
): LogBody {
  const check = index.checks.get(checkId)
  if (check === undefined) throw new Error(`no check ${checkId}`)
  const rows = machine.faults.map((fault) => check.table[fault] ?? check.otherwise)
  const drawn = (rows.length === 0 ? [check.otherwise] : rows).map((row) => pick(row, random))
  const outcome = check.outcomes[Math.max(...drawn)]
  return {
    kind: 'check',
    checkId,
    outcome: outcome?.id ?? '',
    asWritten: true,
    differed: null,
  }
}

/** The steps of a swap in its order, as far as they say something. */
export function endOfSwap(
  index: BookIndex,
  { machine, swapId }: { machine: Machine; swapId: string },
  random: () => number,
): LogBody[] {
  const swap = index.swaps.get(swapId)
  if (swap === undefined) throw new Error(`no swap ${swapId}`)
  const rows = machine.faults.map((fault) => swap.table[fault] ?? swap.otherwise)
  // With two faults the good part cures neither: whichever is left keeps it as it was.
  const ends = (rows.length === 0 ? [swap.otherwise] : rows).map((row) => pick(row, random))
  return swapSteps(swapId, Math.min(...ends))
}

/** The log of a swap: 0 the spare changed nothing, 1 it cured and so did the old part put back, 2 the part was it. */
export function swapSteps(swapId: string, end: number): LogBody[] {
  const step = (
    name: 'spareFitted' | 'oldRefitted' | 'newFitted',
    faultPresent: boolean,
  ): LogBody => ({
    kind: 'swap',
    swapId,
    step: name,
    faultPresent,
    partFrom: 'bag',
    partWords: null,
  })
  if (end === 0) return [step('spareFitted', true)]
  if (end === 1) return [step('spareFitted', false), step('oldRefitted', false)]
  return [step('spareFitted', false), step('oldRefitted', true), step('newFitted', false)]
}

/** The machine after a repair: without the fault, when it was the right one and it took. */
export function afterRepair(
  index: BookIndex,
  { machine, fault }: { machine: Machine; fault: string },
  random: () => number,
): Machine {
  const success = index.faults.get(fault)?.repair?.successOf100 ?? 0
  const took = machine.faults.includes(fault) && random() * 100 < success
  return took ? { ...machine, faults: machine.faults.filter((f) => f !== fault) } : machine
}

/** Checks of the book that this machine allows. */
export const checksFor = (index: BookIndex, features: Features): string[] =>
  [...index.checks.values()].filter((c) => letsThrough(c.gate, features)).map((c) => c.id)

/** The book with every share, row and condition off by a factor up to two, drawn once. */
export function perturbed(items: readonly CodeBookItem[], random: () => number): CodeBookItem[] {
  const off = (x: number): number => x * 2 ** (2 * random() - 1)
  const row = (xs: readonly number[]): number[] => {
    const changed = xs.map(off)
    const sum = changed.reduce((a, b) => a + b, 0)
    return changed.map((x) => (100 * x) / sum)
  }
  const rows = <T extends Record<string, readonly number[]>>(table: T) =>
    Object.fromEntries(Object.entries(table).map(([fault, xs]) => [fault, row(xs)]))
  const triple = ([a = 0, b = 0, c = 0]: readonly number[]): [number, number, number] => [a, b, c]
  return items.map((item): CodeBookItem => {
    if (item.kind === 'fault')
      return { ...item, shares: item.shares.map((s) => ({ ...s, of100: off(s.of100) })) }
    if (item.kind === 'check')
      return { ...item, table: rows(item.table), otherwise: row(item.otherwise) }
    if (item.kind === 'swap')
      return {
        ...item,
        table: Object.fromEntries(
          Object.entries(item.table).map(([fault, xs]) => [fault, triple(row(xs))]),
        ),
        otherwise: triple(row(item.otherwise)),
      }
    return item
  })
}
