/**
 * What a reading's verdict would be in each state, before it is taken: the book's pieces of the true value,
 * the meter's uncertainty there, and the places where the verdict turns (JCGM 106). So the outlook of a reading
 * is that of the meter in the bag, not of meters in general.
 */
import type { CheckItem, Piece } from '@/lib/model/code-book'
import type { SpecValue } from '@/lib/model/machine-model'
import type { MeterProfile, Quantity } from '@/lib/model/meter-profile'
import type { Case } from './case'
import { nominalOf } from './evidence-reading'
import type { Sight } from './evidence-table'
import { type MeterInput, meterInput } from './meter'
import { phi } from './normal'
import { type OutcomeTable, TABLE_FLOOR } from './outcome-table'
import { canDecide, type MeterFitness } from './reading'
import { budgetOf, limitsOf, type ReadingInput, rectangles } from './reading-budget'
import { readingProblem } from './reading-problem'
import { specFor } from './spec-of'

const VERDICTS = ['in', 'tooClose', 'outLow', 'outHigh'] as const

/** True values looked at in each piece. */
const SAMPLES = 24

/** The reading as it would be taken with this meter now: leads as they are, everything at its reference. */
const readingWith = (meter: MeterProfile, quantity: Quantity, spec: SpecValue): MeterInput | null =>
  meterInput(
    meter,
    { nulled: false, partTempC: spec.partTempC, meterTempC: null },
    { quantity, spec },
  )

/** Whether the meter in the bag can decide a check's figure; null without a figure, a meter or its function. */
export function fitnessFor(c: Case, check: CheckItem): MeterFitness | null {
  const spec = specFor(c, check)
  const quantity = check.reading?.quantity
  if (c.meter === null || spec === null || quantity === undefined || limitsOf(spec) === null)
    return null
  const input = readingWith(c.meter, quantity, spec)
  return input === null ? null : canDecide(input)
}

/** Chances of the check's outcomes per state with the meter at hand; null when the book's own table must do. */
export function verdictTable({ c, place }: Sight, check: CheckItem): OutcomeTable | null {
  const spec = specFor(c, check)
  const limits = limitsOf(spec)
  const model = check.reading
  if (c.meter === null || model === null || spec === null || limits === null) return null
  const input = readingWith(c.meter, model.quantity, spec)
  const nominal = nominalOf(spec, model)
  if (input === null || nominal === null || model.good.length === 0) return null
  if (readingProblem({ ...input, value: nominal, overRange: false }) !== null) return null
  const seats = VERDICTS.map((v) => check.outcomes.findIndex((o) => o.id === v))
  const u = uAlong(input)
  const edges = edgesOf(u, limits)
  const row = (pieces: readonly Piece[]) =>
    rowOf({ pieces, nominal, edges, u, seats, count: check.outcomes.length })
  const otherwise = row(model.good)
  if (otherwise === null) return null
  const rows = new Map<number, readonly number[]>()
  for (const [fault, pieces] of Object.entries(model.byFault)) {
    const at = place.get(fault)
    const chances = row(pieces)
    if (chances === null) return null
    if (at !== undefined) rows.set(at, chances)
  }
  return { rows, otherwise }
}

type Input = Omit<ReadingInput, 'value' | 'overRange'>
/** Estimates at which the verdict turns: outLow up to a, in from b to c, outHigh from d. */
type Edges = { a: number; b: number; c: number; d: number }

function edgesOf(
  u: (estimate: number) => number,
  { low, high }: { low: number | null; high: number | null },
): Edges {
  const none = Number.NEGATIVE_INFINITY
  return {
    a: low === null ? none : turning(u, low, 2),
    b: low === null ? none : turning(u, low, -2),
    c: high === null ? Number.POSITIVE_INFINITY : turning(u, high, 2),
    d: high === null ? Number.POSITIVE_INFINITY : turning(u, high, -2),
  }
}

/** The estimate y at which y + k u(y) meets the limit; u grows slower than y, so there is just one. */
function turning(u: (estimate: number) => number, limit: number, k: number): number {
  const reach = 10 * (Math.abs(limit) + u(limit))
  let from = limit - reach
  let to = limit + reach
  for (let i = 0; i < 60; i++) {
    const y = (from + to) / 2
    if (y + k * u(y) < limit) from = y
    else to = y
  }
  return (from + to) / 2
}

/** u by estimate: every half-width of a budget grows straight with the value, so two budgets give them all. */
function uAlong(input: Input): (estimate: number) => number {
  const leads = input.quantity === 'resistance' && !input.nulled
  const shift = leads ? (input.leadsOhm.low + input.leadsOhm.high) / 2 : 0
  const at = (value: number) => budgetOf({ ...input, value, overRange: false })
  const [none, one] = [at(shift), at(shift + 1)]
  const lines = one.lines.map(({ source, halfWidth }) => {
    const start = none.lines.find((line) => line.source === source)?.halfWidth ?? 0
    return { source, halfWidth: start, slope: (halfWidth - start) / (one.estimate - none.estimate) }
  })
  return (estimate) => {
    const size = Math.max(0, estimate)
    const widths = lines.map((l) => ({ ...l, halfWidth: l.halfWidth + l.slope * size }))
    return Math.sqrt(rectangles(widths).reduce((sum, a) => sum + (a * a) / 3, 0))
  }
}

type RowOf = {
  pieces: readonly Piece[]
  nominal: number
  edges: Edges
  u: (estimate: number) => number
  seats: readonly number[]
  count: number
}

function rowOf({ pieces, nominal, edges, u, seats, count }: RowOf): number[] | null {
  const total = pieces.reduce((sum, p) => sum + p.weight, 0)
  const verdicts = [0, 0, 0, 0]
  for (const { weight, from, to } of pieces)
    for (let i = 0; i < SAMPLES; i++) {
      const t = nominal * (from + ((i + 0.5) / SAMPLES) * (to - from))
      const shares = sharesAt(t, u(t), edges)
      shares.forEach((p, v) => {
        verdicts[v] = (verdicts[v] ?? 0) + (p * weight) / total / SAMPLES
      })
    }
  const row = new Array<number>(count).fill(TABLE_FLOOR)
  for (const [v, p] of verdicts.entries()) {
    const seat = seats[v] ?? -1
    if (seat < 0 && p > 1e-3) return null
    if (seat >= 0) row[seat] = (row[seat] ?? 0) + p
  }
  const sum = row.reduce((s, p) => s + p, 0)
  return row.map((p) => p / sum)
}

/** Chances of in, too close, out low and out high for a true value read with this u. */
function sharesAt(t: number, u: number, { a, b, c, d }: Edges): number[] {
  const below = (edge: number) => phi((edge - t) / Math.max(u, 1e-12))
  const outLow = below(a)
  const outHigh = 1 - below(d)
  const inside = Math.max(0, below(c) - below(b))
  return [inside, Math.max(0, 1 - outLow - outHigh - inside), outLow, outHigh]
}
