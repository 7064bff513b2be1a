/**
 * An outcome table with weights over its outcomes as a machine: the outcome so far is a level that only rises.
 * Neighbouring outcomes of equal weight are one level, and a top one of weight 0 is left out: a plain good outcome
 * is a product, a plain bad one two levels. Rows that say one thing alone and another beside others, and rows better
 * than `otherwise`, take further states: none but better ones so far (which one is nearest), one of the former
 * alone for good, and one of them waiting for company.
 */
import type { Machine, Move } from './machine'
import { EVEN, type OutcomeTable, type Push, pushesOf, running } from './outcome-table'

/** The machine of `tableFactor`. */
export function tableMachine(table: OutcomeTable, weights: readonly number[]): Machine {
  const levels = levelsOf(table.otherwise.length, weights)
  const base = running(table.otherwise)
  const pushes = [...pushesOf(table)]
  const better = pushes.filter(([, p]) => p.isBetter).sort(([, a], [, b]) => a.far - b.far)
  const worse = pushes
    .filter(([, p]) => !p.isBetter)
    .map(([f, p]): Row => [f, { ...p, isSteady: isSteady(p, { base, levels }) }])
  const hasUnsteady = worse.some(([, p]) => !p.isSteady)
  if (better.length === 0 && !hasUnsteady) return steadyMachine({ levels, base, worse })
  const seats = seatsOf(better.length, levels.length, hasUnsteady)
  const worth = (row: readonly number[]) => dot(row, weights)
  const end = new Array<number>(seats.size).fill(0)
  ;[table.otherwise, ...better.map(([, p]) => p.row)].forEach((row, j) => {
    end[j] = worth(row)
  })
  levels.forEach(({ weight }, l) => {
    end[seats.level + l] = weight
  })
  if (seats.alone !== null) end[seats.alone] = 1
  const moves = new Map<number, readonly Move[]>()
  for (const [rank, [f]] of better.entries()) moves.set(f, betterMoves(seats, rank + 1))
  for (const [f, push] of worse)
    moves.set(f, worseMoves({ seats, levels, base, push, worth: worth(push.row) }))
  return { start: end.map((_, s) => (s === 0 ? 1 : 0)), end, moves }
}

/** A run of outcomes of the same weight: `last` is the last of them. */
type Level = { last: number; weight: number }

function levelsOf(outcomes: number, weights: readonly number[]): Level[] {
  const levels: Level[] = []
  for (let k = 0; k < outcomes; k++) {
    const weight = weights[k] ?? 0
    const before = levels.at(-1)
    if (before?.weight === weight) before.last = k
    else levels.push({ last: k, weight })
  }
  return levels.at(-1)?.weight === 0 ? levels.slice(0, -1) : levels
}

/** A suspect and its push; `isSteady` where it need not be told apart whether the row stands alone or beside others. */
type Row = readonly [number, Push & { isSteady: boolean }]

/** Whether at the end of every level the row alone is `otherwise` times its q. */
function isSteady(
  { row, beside }: Push,
  { base, levels }: { base: readonly number[]; levels: readonly Level[] },
): boolean {
  const upTo = running(row)
  return levels.every(
    ({ last }) => Math.abs((upTo[last] ?? 1) - (base[last] ?? 1) * (beside[last] ?? 1)) < EVEN,
  )
}

function steadyMachine({
  levels,
  base,
  worse,
}: {
  levels: readonly Level[]
  base: readonly number[]
  worse: readonly Row[]
}): Machine {
  if (levels.length === 0) return { start: [1], end: [0], moves: new Map() }
  const seats = { level: 0, waiting: null }
  const moves = new Map(worse.map(([f, p]) => [f, rising(seats, levels, p.beside)]))
  return { start: shares(levels, base), end: levels.map((l) => l.weight), moves }
}

/** Where the states stand: 0 to `better` none but better ones; then the levels, then alone and waiting. */
type Seats = {
  size: number
  better: number
  level: number
  levels: number
  alone: number | null
  waiting: number | null
}

function seatsOf(better: number, levels: number, hasUnsteady: boolean): Seats {
  const level = better + 1
  const alone = hasUnsteady ? level + levels : null
  const waiting = alone === null ? null : alone + 1
  const size = level + levels + (hasUnsteady ? 1 + levels : 0)
  return { size, better, level, levels, alone, waiting }
}

/** A better one: the nearest so far speaks; wherever something worse is present it changes nothing. */
function betterMoves(seats: Seats, rank: number): Move[] {
  const moves: Move[] = []
  for (let s = 0; s < seats.size; s++) {
    const to = s > seats.better ? s : s === 0 ? rank : Math.min(s, rank)
    moves.push([s, to, 1])
  }
  return moves
}

function worseMoves(given: {
  seats: Seats
  levels: readonly Level[]
  base: readonly number[]
  push: Row[1]
  worth: number
}): Move[] {
  const { seats, levels, base, push } = given
  const moves = rising(seats, levels, push.beside)
  const { alone, waiting } = seats
  const joined = shares(
    levels,
    base.map((c, k) => c * (push.beside[k] ?? 1)),
  )
  for (let s = 0; s <= seats.better; s++) {
    const to = push.isSteady || waiting === null ? seats.level : waiting
    for (const [l, share] of joined.entries()) moves.push([s, to + l, share])
    if (!push.isSteady && alone !== null) moves.push([s, alone, given.worth])
  }
  return moves.filter(([, , weight]) => weight > 0)
}

/** The level rises to the present one's own where that is higher; with company a waiting one counts. */
function rising(
  { level, waiting }: Pick<Seats, 'level' | 'waiting'>,
  levels: readonly Level[],
  beside: readonly number[],
): Move[] {
  const own = shares(levels, beside)
  const moves: Move[] = []
  levels.forEach(({ last }, l) => {
    const stays = beside[last] ?? 1
    for (const from of waiting === null ? [level] : [level, waiting]) {
      moves.push([from + l, level + l, stays])
      for (let to = l + 1; to < levels.length; to++)
        moves.push([from + l, level + to, own[to] ?? 0])
    }
  })
  return moves.filter(([, , weight]) => weight > 0)
}

/** Chances of each level from chances of at most each outcome. */
const shares = (levels: readonly Level[], upTo: readonly number[]): number[] =>
  levels.map(({ last }, l) => {
    const below = l === 0 ? 0 : (upTo[levels[l - 1]?.last ?? -1] ?? 0)
    return Math.max(0, (upTo[last] ?? 1) - below)
  })

const dot = (row: readonly number[], weights: readonly number[]): number =>
  row.reduce((sum, p, k) => sum + p * (weights[k] ?? 0), 0)
