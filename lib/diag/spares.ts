/**
 * Spares for Poisson demand. Palm's theorem: with a mean demand rate and a mean resupply time, the pieces under
 * way are Poisson with mean rate x time, whatever the spread of the resupply times (seen in notes on METRIC).
 * Several parts are bought by marginal analysis: always the piece that takes away the most back-orders per unit
 * of money. That gives the best stock for each sum it passes through, not for sums in between.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { poissonCdf } from './exact-intervals'
import { type FigureProblem, unfit } from './figure-bounds'

/** Largest pipeline these sums are made for; above it a bag or a van is not what is planned. */
const MOST_MEAN = 1000

/**
 * Mean number of pieces under way: demand per day times mean resupply time in days (Palm). Both from 0; the product
 * at most 1,000. Answers the first field that lies outside.
 */
export function pipelineMean(
  demandPerDay: number,
  resupplyDays: number,
): Result<number, FigureProblem> {
  const problem = unfit({
    demandPerDay: [demandPerDay, 0, MOST_MEAN],
    resupplyDays: [resupplyDays, 0, MOST_MEAN],
    pipelineMean: [demandPerDay * resupplyDays, 0, MOST_MEAN],
  })
  return problem === null ? ok(demandPerDay * resupplyDays) : fail(problem)
}

/**
 * Smallest stock s with P(demand <= s) at least `service`. Mean 0 to 1,000; service 0 to 1, where 1 answers
 * the stock past which a piece adds nothing that a number can show.
 */
export function spareStock(mean: number, service: number): Result<number, FigureProblem> {
  const problem = unfit({ mean: [mean, 0, MOST_MEAN], service: [service, 0, 1] })
  if (problem !== null) return fail(problem)
  let s = 0
  // The sum may stop a rounding short of 1: past the mean, a step that adds nothing is the last.
  for (let sum = poissonCdf(s, mean); sum < service; s++) {
    const next = poissonCdf(s + 1, mean)
    if (s > mean && next <= sum) break
    sum = next
  }
  return ok(s)
}

/** What a stock does at a mean demand: all shares 0 to 1, back-orders in pieces. */
export type StockFigures = {
  /** P(demand <= stock): chance that nobody waits at a random moment. */
  serviceLevel: number
  /** P(demand <= stock - 1): share of demands filled from the shelf. */
  fillRate: number
  /** Expected back-orders, EBO(s + 1) = EBO(s) - P(X > s) from EBO(0) = mean. */
  backOrders: number
}

/** Service level, fill rate and expected back-orders of a whole stock 0 to 2,000 at a mean 0 to 1,000. */
export function stockFigures(stock: number, mean: number): Result<StockFigures, FigureProblem> {
  const problem = unfit({
    stock: [Number.isInteger(stock) ? stock : Number.NaN, 0, 2 * MOST_MEAN],
    mean: [mean, 0, MOST_MEAN],
  })
  if (problem !== null) return fail(problem)
  let backOrders = mean
  for (let s = 0; s < stock; s++) backOrders = Math.max(0, backOrders - short(s, mean))
  return ok({
    serviceLevel: poissonCdf(stock, mean),
    fillRate: stock === 0 ? 0 : poissonCdf(stock - 1, mean),
    backOrders,
  })
}

/** A part that may be bought: its mean pipeline demand and the price of one piece in minor units of money. */
export type SparePart = { id: string; mean: number; costMinor: number }

/** One piece bought: which part, its stock then, all back-orders left over all parts, and money spent so far. */
export type Purchase = { id: string; stock: number; backOrders: number; spentMinor: number }

/**
 * The pieces to buy, best first, as long as the next best one is within the budget. Equal worth goes by id. Ends
 * where no piece takes away more than a billionth of a back-order. Prices from 1 minor unit, means 0 to 1,000.
 */
export function buyInOrder(
  parts: readonly SparePart[],
  budgetMinor: number,
): Result<Purchase[], FigureProblem> {
  const problem = unfit({
    budgetMinor: [budgetMinor, 0, Number.MAX_SAFE_INTEGER],
    ...Object.fromEntries(
      parts.flatMap(({ id, mean, costMinor }) => [
        [`${id}.mean`, [mean, 0, MOST_MEAN] as const],
        [`${id}.costMinor`, [costMinor, 1, Number.MAX_SAFE_INTEGER] as const],
      ]),
    ),
  })
  if (problem !== null) return fail(problem)
  const shelf = parts.map((part) => ({ ...part, stock: 0, gain: short(0, part.mean) }))
  const bought: Purchase[] = []
  let backOrders = parts.reduce((sum, { mean }) => sum + mean, 0)
  let spentMinor = 0
  for (;;) {
    const best = shelf.toSorted(byWorth)[0]
    if (best === undefined || best.gain < 1e-9) return ok(bought)
    if (spentMinor + best.costMinor > budgetMinor) return ok(bought)
    backOrders = Math.max(0, backOrders - best.gain)
    spentMinor += best.costMinor
    best.stock += 1
    best.gain = short(best.stock, best.mean)
    bought.push({ id: best.id, stock: best.stock, backOrders, spentMinor })
  }
}

/** P(demand > stock): what one more piece takes off the back-orders. */
const short = (stock: number, mean: number): number => 1 - poissonCdf(stock, mean)

type Shelf = SparePart & { gain: number }
const byWorth = (a: Shelf, b: Shelf): number =>
  b.gain / b.costMinor - a.gain / a.costMinor || (a.id < b.id ? -1 : 1)
