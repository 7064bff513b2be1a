/**
 * Invented troubleshooting models for the benchmark, from a seed: of the kinds that tests/diag/samples holds
 * (plain, set-ups, parts, imperfect repairs with wrong passes, daylight), at any number of suspects and checks.
 */
import type { SingleModel } from '@/lib/diag/troubleshoot-model'

export const FAMILIES = ['basic', 'setup', 'parts', 'imperfect', 'daylight'] as const
export type Family = (typeof FAMILIES)[number]

/** A stream of numbers from 0 to 1 (mulberry32, public domain). */
export function randomFrom(seed: number): () => number {
  let a = seed >>> 0
  return () => {
    a = (a + 0x6d2b79f5) >>> 0
    let t = Math.imul(a ^ (a >>> 15), a | 1)
    t = (t + Math.imul(t ^ (t >>> 7), t | 61)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32
  }
}

type Size = { faults: number; checks: number }

/** One model; the same seed gives the same model. */
export function inventedModel(family: Family, { faults, checks }: Size, seed: number): SingleModel {
  const random = randomFrom(seed * 7919 + FAMILIES.indexOf(family) * 104_729 + faults)
  const between = (low: number, high: number) => low + Math.floor(random() * (high - low + 1))
  const ids = Array.from({ length: faults }, (_, i) => `f${i + 1}`)
  const setups = family === 'setup' || family === 'imperfect' ? ['u1', 'u2', 'u3'] : []
  const setupOf = () => setups.filter(() => random() < 0.25)
  const checkOf = (c: number) => inventedCheck({ c, ids, setup: setupOf() }, random)
  return {
    kind: 'single',
    ratePerMinute: 1,
    faults: ids.map((id) => ({
      id,
      prior: 0.02 + random() ** 2,
      repair: {
        cost: between(2, 40),
        minutes: between(5, 60),
        setup: setupOf(),
        ...(family === 'parts' && random() < 0.5 ? { needsPart: `p-${id}` } : {}),
        ...(family === 'imperfect' && random() < 0.4 ? { success: 0.7 + 0.3 * random() } : {}),
      },
    })),
    ...(family === 'imperfect'
      ? {
          extraRepairs: [
            { id: 'clean', cost: 0, minutes: 8, setup: [], fixes: { f1: 0.5, f2: 0.6, f3: 0.3 } },
          ],
        }
      : {}),
    parts: { onHand: ids.filter(() => random() < 0.6).map((id) => `p-${id}`) },
    checks: Array.from({ length: checks }, (_, c) => checkOf(c)),
    setups: setups.map((id, i) => ({
      id,
      minutes: between(3, 12),
      requires: i === 2 ? ['u1'] : [],
      closedByTest: i === 1,
    })),
    verify: {
      cost: 0,
      minutes: between(1, 5),
      ...(family === 'imperfect' ? { falsePass: { f1: 0.1 }, comebackCost: 280 } : {}),
    },
    stops: [
      { id: 'tow', cost: between(150, 300) },
      ...(family === 'parts' ? [{ id: 'limp', cost: 45, costByFault: { f1: 320, f2: 150 } }] : []),
    ],
    ...(family === 'daylight' ? { daylight: { minutes: between(50, 90) } } : {}),
  }
}

type CheckOf = { c: number; ids: readonly string[]; setup: string[] }

/** A check that points at a few faults: yes or no, or a reading that is low, normal or high. */
function inventedCheck(
  { c, ids, setup }: CheckOf,
  random: () => number,
): SingleModel['checks'][number] {
  const reads = random() < 0.4
  const slip = 0.05 + 0.15 * random()
  const row = (): number[] => {
    const hit = random() < Math.min(0.4, 3 / ids.length + 0.1)
    if (!reads) return hit ? [slip, 1 - slip] : [1 - slip, slip]
    const side = random() < 0.5
    if (!hit) return [slip / 2, 1 - slip, slip / 2]
    return side ? [0.9 - slip, slip, 0.1] : [0.1, slip, 0.9 - slip]
  }
  return {
    id: `c${c + 1}`,
    cost: 0,
    minutes: 2 + Math.floor(random() * 10),
    setup,
    outcomes: reads ? ['low', 'normal', 'high'] : ['ok', 'bad'],
    p: Object.fromEntries(ids.map((id) => [id, row()])),
  }
}
