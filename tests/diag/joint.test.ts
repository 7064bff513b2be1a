import { describe, expect, it } from 'vitest'
import { belief } from '@/lib/diag/belief'
import { indexBook } from '@/lib/diag/book-index'
import type { Case } from '@/lib/diag/case'
import { chancesOf, type Factor } from '@/lib/diag/factor'
import { absorb, startJoint, summarise } from '@/lib/diag/joint'
import { candidates, solveC } from '@/lib/diag/priors'
import { caseOf, checked, code, log, swapped } from './fixtures/entries'
import { fault, SMALL_ITEMS } from './fixtures/small-book'

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

describe('[E1] many suspects', () => {
  const n = 14
  const factors: Factor[] = Array.from({ length: 5 }, (_, e) => ({
    scope: Array.from({ length: n }, (_x, f) => f).filter((f) => (f + e) % 2 === 0),
    at: (present) => 1 - 0.97 * present.reduce((p, f) => p * (1 - 0.1 - ((f * 3 + e) % 8) / 10), 1),
  }))
  const c = solveC(
    Array.from({ length: n }, () => 1 / n),
    0.05,
  )
  const terms = [{ weight: 1, odds: Array.from({ length: n }, () => c / n) }]
  const reckoned = (exact: number) => {
    const joint = startJoint(factors, exact)
    for (const f of factors) absorb(joint, f)
    return summarise(joint, terms)
  }
  it('[E1] above the limit all sets of at most four faults come within 1e-4 of the full sum, under hard evidence', () => {
    const full = reckoned(16)
    const few = reckoned(4)
    for (const [f, p] of full.marginals.entries())
      expect(Math.abs(p - few.marginals[f]!)).toBeLessThan(1e-4)
  })
  it('[E1] suspects that no evidence touches factor out exactly', () => {
    const more = [{ weight: 1, odds: [...terms[0]!.odds, 0.03, 0.2] }]
    const joint = startJoint(factors)
    for (const f of factors) absorb(joint, f)
    const got = summarise(joint, more)
    const touching = { scope: [n, n + 1], at: () => 1 }
    const wide = startJoint([...factors, touching])
    for (const f of [...factors, touching]) absorb(wide, f)
    const want = summarise(wide, more)
    for (const [f, p] of got.marginals.entries()) expect(p).toBeCloseTo(want.marginals[f]!, 13)
    expect(got.twoOrMore).toBeCloseTo(want.twoOrMore, 12)
    for (const [f, p] of got.only.entries()) expect(p).toBeCloseTo(want.only[f]!, 13)
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
