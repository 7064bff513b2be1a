/**
 * From shares to independent priors (rule R5): p = c s / (1 + c s), s = share / sum of shares, with c such
 * that P(two or more | at least one) = m / 100. With these priors the odds of a fault are c s, so
 * P(none) = 1 / prod(1 + c s) and P(exactly one) = c P(none): c is found by bisection, to the last bit.
 */
import type { Gate } from '@/lib/model/features'
import { type BookIndex, SOMETHING_ELSE } from './book-index'
import type { Case } from './case'
import { letsThrough, opens } from './gate'

/** One suspect before any evidence: share of 100 (scaled over the gated ones) and odds of being present. */
export type Candidate = { fault: string; name: string; of100: number; odds: number }

/** Share of "something else" when a list leaves it no room, of 100 (common practice, no source). */
export const LEAST_SOMETHING_ELSE = 5
/** m where nobody knows it (rule R5: practice). */
export const TWO_WRONG_OF_100 = 5

/**
 * The suspects of a case in the book's order, `somethingElse` last; just that one when no symptom is known.
 * Its share is the book's own, else what the elicited list leaves of 100 before this machine's gates cut it.
 */
export function candidates({ index, features, symptom }: Case): Candidate[] {
  const listed: { fault: string; name: string; share: number }[] = []
  let else100: number | null = null
  let elicited = 0
  for (const fault of symptom === null ? [] : index.faults.values()) {
    const share = shareFor(fault.shares, symptom, features)
    if (share === null || !(share > 0 && Number.isFinite(share))) continue
    if (fault.id === SOMETHING_ELSE) else100 = share
    else elicited += share
    if (fault.id !== SOMETHING_ELSE && letsThrough(fault.gate, features))
      listed.push({ fault: fault.id, name: fault.name, share })
  }
  const rest = else100 ?? (elicited < 100 ? 100 - elicited : LEAST_SOMETHING_ELSE)
  listed.push({ fault: SOMETHING_ELSE, name: elseName(index), share: rest })
  const total = listed.reduce((sum, f) => sum + f.share, 0)
  const scaled = listed.map((f) => ({
    fault: f.fault,
    name: f.name,
    of100: (100 * f.share) / total,
  }))
  const c = solveC(
    scaled.map((f) => f.of100 / 100),
    twoWrong(index, symptom) / 100,
  )
  return scaled.map((f) => ({ ...f, odds: (c * f.of100) / 100 }))
}

/**
 * The factor c for shares s (sum 1) at which two or more are wrong with this chance, given at least one.
 * A chance of 0 answers the smallest c reckoned with (1e-9); with a single suspect any c serves: 0.1.
 */
export function solveC(shares: readonly number[], twoOrMore: number): number {
  if (usable(shares).length < 2) return 0.1
  let low = 1e-9
  let high = 1e6
  if (chanceOfTwo(shares, low) >= twoOrMore) return low
  for (let i = 0; i < 200; i++) {
    const middle = Math.sqrt(low * high)
    if (chanceOfTwo(shares, middle) < twoOrMore) low = middle
    else high = middle
  }
  return high
}

/** P(two or more | at least one) for independent faults with odds c s. */
export function chanceOfTwo(shares: readonly number[], c: number): number {
  const all = usable(shares)
  const atLeastOne = Math.expm1(all.reduce((sum, s) => sum + Math.log1p(c * s), 0))
  const one = all.reduce((sum, s) => sum + c * s, 0)
  return atLeastOne > 0 ? Math.max(0, 1 - one / atLeastOne) : 0
}

/** Shares above 0; anything else is none. */
const usable = (shares: readonly number[]): number[] =>
  shares.filter((s) => s > 0 && Number.isFinite(s))

const elseName = (index: BookIndex): string =>
  index.faults.get(SOMETHING_ELSE)?.name ?? 'Something else'

function twoWrong(index: BookIndex, symptom: string | null): number {
  const item = symptom === null ? undefined : index.symptoms.get(symptom)
  return item?.twoWrongOf100 ?? TWO_WRONG_OF_100
}

/** The share that fits this machine best: the one whose open gate names most features, else one not shut. */
function shareFor(
  shares: readonly { symptom: string; gate: Gate; of100: number }[],
  symptom: string | null,
  features: Case['features'],
): number | null {
  let best: { of100: number; rank: number } | null = null
  for (const share of shares) {
    if (share.symptom !== symptom) continue
    const state = opens(share.gate, features)
    if (state === 'shut') continue
    const rank = (state === 'open' ? 100 : 0) + Object.keys(share.gate).length
    if (best === null || rank > best.rank) best = { of100: share.of100, rank }
  }
  return best?.of100 ?? null
}
