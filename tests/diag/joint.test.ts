import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import type { Case } from '@/lib/diag/case'
import { type Factor, tableFactor } from '@/lib/diag/factor'
import { chancesOf, type OutcomeTable } from '@/lib/diag/outcome-table'
import { candidates, solveC } from '@/lib/diag/priors'
import { caseOf, checked, code, log, swapped } from './fixtures/entries'
import { fault, SMALL_ITEMS } from './fixtures/small-book'
import { summed } from './fixtures/summed'

const chances = (c: Case): Record<string, number> =>
  Object.fromEntries(belief(c).suspects.map((s) => [s.fault, s.chance]))

describe('[E1] against plain enumeration', () => {
  it('[E1] noisy-OR, noisy-max and the swap, to 1e-9', () => {
    const c = caseOf(
      log(
        code(1268, 3),
        checked('plug', 'bad'),
        checked('spark', 'so'),
        swapped('spareFitted', false),
      ),
    )
    const list = candidates(c)
    const row = (xs: number[]) => chancesOf(xs)
    const roles: Record<string, number> = { coil: 0.2, wire: 0.18, driver: 0.3 }
    const sums = list.map(() => 0)
    let total = 0
    for (let set = 1; set < 2 ** list.length; set++) {
      const names = list.flatMap((s, i) => (((set >> i) & 1) === 1 ? [s.fault] : []))
      let w = names.reduce((p, n) => p * (list.find((s) => s.fault === n)?.odds ?? 0), 1)
      w *= 1 - names.reduce((p, n) => (n in roles ? (p * (1 - roles[n]!)) / 0.995 : p), 0.995)
      const plug: Record<string, number> = { coil: row([40, 60])[0]!, wire: row([60, 40])[0]! }
      const good = row([95, 5])[0]!
      w *= 1 - names.reduce((p, n) => (n in plug ? (p * plug[n]!) / good : p), good)
      w *= soSo(names)
      w *= notUnchanged(names)
      total += w
      list.forEach((_, i) => {
        if (((set >> i) & 1) === 1) sums[i] = (sums[i] ?? 0) + w
      })
    }
    const got = chances(c)
    for (const [i, s] of list.entries())
      expect(Math.abs((got[s.fault] ?? -1) - sums[i]! / total)).toBeLessThan(1e-9)
  })
  /** P(at most fine) and P(at most so so) multiply over the faults that push away from them. */
  function soSo(names: string[]): number {
    const rows: Record<string, number[]> = {
      coil: [10, 30, 60],
      wire: [20, 20, 60],
      filter: [80, 15, 5],
    }
    const base = chancesOf([85, 10, 5])
    const upTo = (k: number) => {
      const b = base.slice(0, k + 1).reduce((x, y) => x + y, 0)
      const all = names.flatMap((n) =>
        n in rows
          ? [
              chancesOf(rows[n]!)
                .slice(0, k + 1)
                .reduce((x, y) => x + y, 0),
            ]
          : [],
      )
      const worse = all.filter((x) => x < b)
      if (all.length === 0) return b
      return worse.length === 0 ? Math.min(...all) : worse.reduce((p, x) => (p * x) / b, b)
    }
    return upTo(1) - upTo(0)
  }
  /** Gone with the good part: the fault nearest to "no change" speaks. */
  function notUnchanged(names: string[]): number {
    const rows: Record<string, number[]> = { coil: [5, 5, 90], wire: [70, 28, 2] }
    const gone = (xs: number[]) => chancesOf(xs)[1]! + chancesOf(xs)[2]!
    const present = names.filter((n) => n in rows).map((n) => gone(rows[n]!))
    return present.length === 0 ? gone([80, 17, 3]) : Math.min(...present)
  }
})

/** A table whose rows are steady: two or three outcomes, rows of `strong` faults plainly bad. */
function steadyTable(n: number, outcomes: number, seed: number): OutcomeTable {
  const rows = new Map<number, number[]>()
  for (let f = 0; f < n; f++) {
    const roll = (f * 7919 + seed * 104_729) % 97
    if (roll < 20) continue
    const good = (f + seed) % 5 === 0 ? 8 : 60 + (roll % 30)
    rows.set(f, chancesOf(outcomes === 2 ? [good, 100 - good] : [good, 20, 80 - good / 2]))
  }
  return { rows, otherwise: chancesOf(outcomes === 2 ? [97, 3] : [94, 4, 2]) }
}

/** P(at most outcome k | set) for every set at once, by doubling: the plain definition, with no machine in it. */
function upToOf(table: OutcomeTable, k: number, n: number): Float64Array {
  const cumulated = (row: readonly number[]) =>
    k >= row.length - 1 ? 1 : row.slice(0, k + 1).reduce((a, b) => a + b, 0)
  const base = k < 0 ? 0 : cumulated(table.otherwise)
  const all = new Float64Array(2 ** n).fill(base)
  for (let f = 0; f < n; f++) {
    const row = table.rows.get(f)
    const ratio = row === undefined || k < 0 ? 1 : cumulated(row) / base
    for (let set = 2 ** f; set < 2 ** (f + 1); set++) all[set] = all[set - 2 ** f]! * ratio
  }
  return all
}

function bruteForce(odds: readonly number[], seen: readonly { table: OutcomeTable; k: number }[]) {
  const n = odds.length
  const weight = new Float64Array(2 ** n).fill(1)
  for (let f = 0; f < n; f++)
    for (let set = 2 ** f; set < 2 ** (f + 1); set++) weight[set] = weight[set - 2 ** f]! * odds[f]!
  for (const { table, k } of seen) {
    const [upTo, below] = [upToOf(table, k, n), upToOf(table, k - 1, n)]
    for (let set = 0; set < weight.length; set++) weight[set]! *= upTo[set]! - below[set]!
  }
  let total = 0
  const sums = odds.map(() => 0)
  for (let set = 1; set < weight.length; set++) {
    total += weight[set]!
    for (let f = 0; f < n; f++) if ((set >> f) & 1) sums[f]! += weight[set]!
  }
  return sums.map((s) => s / total)
}

const evenOdds = (n: number) => {
  const shares = Array.from({ length: n }, (_, f) => 1 + (f % 4))
  const sum = shares.reduce((a, b) => a + b, 0)
  const c = solveC(
    shares.map((s) => s / sum),
    0.05,
  )
  return shares.map((s) => (c * s) / sum)
}
const plain = (table: OutcomeTable, k: number): Factor =>
  tableFactor(
    table,
    table.otherwise.map((_, j) => (j === k ? 1 : 0)),
  )

describe('[E1] many suspects', () => {
  it.each([
    [17, 4],
    [18, 5],
    [19, 6],
    [20, 7],
  ])(
    '[E1] %i suspects, %i surprising outcomes that point apart, to 1e-9 of the full sum',
    (n, pieces) => {
      const seen = Array.from({ length: pieces }, (_, i) => {
        const table = steadyTable(n, i % 3 === 2 ? 3 : 2, i + 1)
        return { table, k: i % 3 === 2 ? 1 : i === 4 ? 0 : 1 }
      })
      const odds = evenOdds(n)
      const got = summed(
        odds,
        seen.map(({ table, k }) => plain(table, k)),
      )
      expect(got.twoOrMore).toBeGreaterThan(0.2)
      for (const [f, p] of bruteForce(odds, seen).entries())
        expect(Math.abs(got.marginals[f]! - p)).toBeLessThan(1e-9)
    },
  )
  it('[E1] where the way forward is too long to keep, the way back is the same', () => {
    const factors = Array.from({ length: 16 }, (_, i) => plain(steadyTable(30, 2, i + 1), 1))
    const odds = evenOdds(30)
    const all = summed(odds, factors)
    for (const f of [0, 17]) {
      const without = summed(
        odds.map((o, i) => (i === f ? 0 : o)),
        factors,
      )
      const absent = Math.exp(without.logEvidence - all.logEvidence)
      expect(Math.abs(all.marginals[f]! - (1 - absent))).toBeLessThan(1e-10)
    }
  }, 60_000)
  it('[E1] suspects that no evidence touches factor out exactly', () => {
    const n = 12
    const factors = [1, 2, 3].map((i) => plain(steadyTable(n, 2, i), 1))
    const odds = [...evenOdds(n), 0.03, 0.2]
    const got = summed(odds, factors)
    const seen = [1, 2, 3].map((i) => ({ table: steadyTable(n, 2, i), k: 1 }))
    const want = bruteForce(odds, seen)
    for (const [f, p] of got.marginals.entries()) expect(p).toBeCloseTo(want[f]!, 12)
  })
  it('[E1] thirty suspects, all named by one check, are reckoned and say what they are', () => {
    const faults = Array.from({ length: 30 }, (_, i) => fault(`many${i}`, 3))
    const table = Object.fromEntries(faults.map((f, i) => [f.id, [10 + i, 90 - i]]))
    const wide = {
      ...SMALL_ITEMS.find((i) => i.kind === 'check')!,
      id: 'wide',
      table,
      otherwise: [95, 5],
    }
    const index = indexBook({
      version: 1,
      hash: '',
      publishedAt: '',
      items: [...SMALL_ITEMS.filter((i) => i.kind === 'symptom'), ...faults, wide],
    })
    const b = belief(caseOf(log(checked('wide', 'bad')), { index }))
    expect(b.suspects).toHaveLength(31)
    expect(b.suspects[0]?.fault).toBe('many0')
  })
})
