import { inShape } from '@/lib/model/book-shape'
import type {
  CheckItem,
  CodeBook,
  CodeBookItem,
  FailureItem,
  FaultItem,
  FeatureItem,
  PcodeItem,
  SetupItem,
  SpnItem,
  SwapItem,
  SymptomItem,
  WordItem,
} from '@/lib/model/code-book'
import { assertNever } from '@/lib/model/result'

/** The id under which "something else" stands in every list of suspects (rule R5). */
export const SOMETHING_ELSE = 'somethingElse'

/** One published code book, looked up by id. Words share ids across kinds, so they go by `kind:id`. */
export type BookIndex = {
  version: number
  symptoms: ReadonlyMap<string, SymptomItem>
  faults: ReadonlyMap<string, FaultItem>
  checks: ReadonlyMap<string, CheckItem>
  swaps: ReadonlyMap<string, SwapItem>
  spns: ReadonlyMap<number, SpnItem>
  pcodes: ReadonlyMap<string, PcodeItem>
  failures: ReadonlyMap<string, FailureItem>
  failuresByFmi: ReadonlyMap<number, FailureItem>
  setups: ReadonlyMap<string, SetupItem>
  words: ReadonlyMap<string, WordItem>
  features: ReadonlyMap<string, FeatureItem>
  /** Ids of the withdrawals that were applied to it (lib/diag/withdrawn.ts); empty as it was published. */
  withdrawn: readonly string[]
  /** Limits of the book's own that were withdrawn, by check. */
  withdrawnLimits: ReadonlyMap<string, { low: number | null; high: number | null; source: string }>
}

/** The book as maps by id; order of insertion is the order of the book. A later item of the same id wins. */
export function indexBook(book: CodeBook): BookIndex {
  const maps = emptyMaps(book.version)
  for (const item of book.items) place(maps, inShape(item))
  return maps
}

/** The trade's name of a part, tool, system or circuit; the id itself when the book has no such word. */
export const wordName = (index: BookIndex, kind: WordItem['kind'], id: string): string =>
  index.words.get(`${kind}:${id}`)?.name ?? id

/** The failure kind a P-code names: by the failure's id, else the first one of that kind; null when unknown. */
export function failureOf(index: BookIndex, failure: string): FailureItem | null {
  const byId = index.failures.get(failure)
  if (byId !== undefined) return byId
  for (const item of index.failures.values()) if (item.failure === failure) return item
  return null
}

/** The swaps of the faults a check tells apart, by its own table or by its reading, in the book's order. */
export function swapsFor(index: BookIndex, check: CheckItem): SwapItem[] {
  const faults = new Set([
    ...Object.keys(check.table),
    ...Object.keys(check.reading?.byFault ?? {}),
  ])
  return [...index.swaps.values()].filter((swap) => faults.has(swap.fault))
}

const emptyMaps = (version: number) => ({
  version,
  symptoms: new Map<string, SymptomItem>(),
  faults: new Map<string, FaultItem>(),
  checks: new Map<string, CheckItem>(),
  swaps: new Map<string, SwapItem>(),
  spns: new Map<number, SpnItem>(),
  pcodes: new Map<string, PcodeItem>(),
  failures: new Map<string, FailureItem>(),
  failuresByFmi: new Map<number, FailureItem>(),
  setups: new Map<string, SetupItem>(),
  words: new Map<string, WordItem>(),
  features: new Map<string, FeatureItem>(),
  withdrawn: [],
  withdrawnLimits: new Map<string, { low: number | null; high: number | null; source: string }>(),
})

function place(maps: ReturnType<typeof emptyMaps>, item: CodeBookItem): void {
  switch (item.kind) {
    case 'symptom':
      maps.symptoms.set(item.id, item)
      return
    case 'fault':
      maps.faults.set(item.id, item)
      return
    case 'check':
      maps.checks.set(item.id, item)
      return
    case 'swap':
      maps.swaps.set(item.id, item)
      return
    case 'spn':
      maps.spns.set(item.spn, item)
      return
    case 'pcode':
      maps.pcodes.set(item.code, item)
      return
    case 'failure':
      maps.failures.set(item.id, item)
      if (item.fmi !== null) maps.failuresByFmi.set(item.fmi, item)
      return
    case 'setup':
      maps.setups.set(item.id, item)
      return
    case 'feature':
      maps.features.set(item.id, item)
      return
    case 'part':
    case 'tool':
    case 'system':
    case 'circuit':
      maps.words.set(`${item.kind}:${item.id}`, item)
      return
    default:
      assertNever(item)
  }
}
