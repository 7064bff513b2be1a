import type { CheckItem, CodeBookItem, SwapItem, WordItem } from '@/lib/model/code-book'
import { FEATURES, type FeatureName, type Features, type Gate } from '@/lib/model/features'
import type { MachineModel } from '@/lib/model/machine-model'

/** What the checker of a code book can find; each kind is a rule of docs/spec/code-book.md. */
export const BOOK_PROBLEMS = [
  'shape',
  'idTwice',
  'unresolved',
  'source',
  'orphan',
  'rows',
  'order',
  'tellsNothing',
  'shares',
  'unreachable',
  'inseparable',
  'twoOrMore',
  'caution',
  'guideSafe',
  'reading',
  'failureKinds',
  'people',
  'readingLevel',
  'sameRows',
  'firstLook',
  'asked',
] as const
export type BookProblemKind = (typeof BOOK_PROBLEMS)[number]

/** One finding: which rule, which record, and what is wrong in a sentence. */
export type BookProblem = { kind: BookProblemKind; id: string; words: string }

/** The parsed items by kind, in the order of the book. */
export type Shelf = {
  [K in CodeBookItem['kind']]: K extends WordItem['kind']
    ? WordItem[]
    : Extract<CodeBookItem, { kind: K }>[]
}
export type Books = { shelf: Shelf; models: readonly MachineModel[] }

/** The items sorted by their kind. */
export function shelve(items: readonly CodeBookItem[]): Shelf {
  const shelf: Shelf = {
    feature: [],
    symptom: [],
    fault: [],
    check: [],
    swap: [],
    spn: [],
    pcode: [],
    failure: [],
    setup: [],
    part: [],
    tool: [],
    system: [],
    circuit: [],
  }
  for (const item of items) (shelf[item.kind] as CodeBookItem[]).push(item)
  return shelf
}

/** Whether a machine with these features passes a gate; a feature not known widens (rule R4). */
export const passes = (gate: Gate, features: Features): boolean =>
  Object.entries(gate).every(([name, allowed]) => {
    const value = features[name as FeatureName]
    return value === undefined || allowed.includes(value)
  })

/** Every combination of values of the features that these gates name. */
export function machinesFor(gates: readonly Gate[]): Features[] {
  const names = [...new Set(gates.flatMap((gate) => Object.keys(gate)))] as FeatureName[]
  return names.reduce<Features[]>(
    (machines, name) =>
      machines.flatMap((machine) => FEATURES[name].map((value) => ({ ...machine, [name]: value }))),
    [{}],
  )
}

/** The running sums of a row: chances of this outcome or a better one. */
export function runningSums(row: readonly number[]): number[] {
  let sum = 0
  return row.map((x) => {
    sum += x
    return sum
  })
}

/**
 * How far two rows of an action differ in one outcome, at most: a ratio, taken where one of them has `least`
 * of 100 or more. "Too close to call" tells of the meter, not of the fault, and is left out.
 */
export function widestRatio(
  action: CheckItem | SwapItem,
  [a, b]: readonly [readonly number[], readonly number[]],
  least: number,
): number {
  return a.reduce((widest, x, i) => {
    if (action.kind === 'check' && action.outcomes[i]?.id === 'tooClose') return widest
    const y = b[i] ?? 0
    const high = Math.max(x, y)
    return high < least ? widest : Math.max(widest, high / Math.max(Math.min(x, y), 0.1))
  }, 1)
}

/** Two rows that part at least this far tell their faults apart. */
export const TELLS = 1.5
/** An outcome counts for the worth of a check from 5 of 100, for telling two faults apart from 20 of 100. */
export const COUNTS = { forCheck: 5, forPair: 20 }
