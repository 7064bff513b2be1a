// npm run bench:diag [-- --quick]: how long decisions take by size, and what they cost above the optimum,
// beside the plain one-step rule; marginals beside brute force. Prints, and writes docs/performance.md.
import { performance } from 'node:perf_hooks'
import { lookAhead } from '@/lib/diag/look-ahead'
import { leftOf, openOf, problemOf, weightsOf } from '@/lib/diag/search-problem'
import { marginals, nextAction } from '@/lib/diag/troubleshoot'
import { type NoisyOrModel, type SingleModel, START } from '@/lib/diag/troubleshoot-model'
import { bruteMarginals } from '../../diag/fixtures/models'
import { type Policy, treeCost } from '../../diag/tree-walk'
import { enginePolicy } from '../engine-policy'
import { machineFacts, mean, table, writePart } from '../marked-part'
import { simulatedCost } from './job'
import { FAMILIES, inventedModel, randomFrom } from './models'

const quick = process.argv.includes('--quick')
/** Expansions after which the optimum is given up on. */
const PATIENT = 3_000_000

/** So often each model's decision is timed. */
const TIMES = 5
const COLD = { faults: 8, checks: 8 }

type Size = { faults: number; checks: number; models: number; jobs: number }
const SIZES: Size[] = [
  { faults: 5, checks: 5, models: 20, jobs: 0 },
  { faults: 8, checks: 8, models: 6, jobs: 0 },
  { faults: 15, checks: 20, models: 4, jobs: 20 },
  { faults: 30, checks: 45, models: 3, jobs: 20 },
  { faults: 60, checks: 120, models: 3, jobs: 10 },
]

/** The plain rule: the best action by one step and repairs in p/c order behind it. */
const oneStep = (model: SingleModel): Policy => {
  const problem = problemOf(model)
  return (state) => {
    const spot = {
      w: weightsOf(model, problem, state),
      ...leftOf(problem, state),
      open: openOf(model, state),
      elapsed: state.elapsed,
    }
    const [best] = lookAhead(problem, spot, 0)
    if (best === undefined) throw new Error('nothing ends the job')
    const list = { check: problem.checks, repair: problem.repairs, stop: problem.stops }[best.type]
    return { type: best.type, id: list[best.index]?.id ?? '' }
  }
}
const timed = <T>(run: () => T): { ms: number; value: T } => {
  const from = performance.now()
  const value = run()
  return { ms: performance.now() - from, value }
}
const sorted = (xs: readonly number[]) => [...xs].sort((a, b) => a - b)
const at = (xs: readonly number[], share: number) =>
  sorted(xs)[Math.min(xs.length - 1, Math.floor(share * xs.length))] ?? Number.NaN
const percent = (x: number) => `${(100 * x).toFixed(x !== 0 && Math.abs(x) < 0.001 ? 4 : 2)} %`
const most = (xs: readonly number[]) => (xs.length === 0 ? 0 : Math.max(...xs))

type Row = { first: number[]; rule: number[]; gaps: number[]; above: number[]; ruleAbove: number[] }
const emptyRow = (): Row => ({ first: [], rule: [], gaps: [], above: [], ruleAbove: [] })

type Sized = Size & { list: SingleModel[]; row: Row }

const modelsOf = ({ faults, checks, models }: Size): SingleModel[] =>
  FAMILIES.flatMap((family) =>
    Array.from({ length: quick ? 2 : models }, (_, i) =>
      inventedModel(family, { faults, checks }, i + 1),
    ),
  )

/** Every decision and the rule's, before any is priced: what pricing leaves to clear away is none of theirs. */
function time({ list, row }: Sized): void {
  for (const model of list) nextAction(model, START) // warms up
  for (const model of list) {
    for (let times = 0; times < TIMES; times++)
      row.first.push(timed(() => nextAction(model, START)).ms)
    row.rule.push(timed(() => oneStep(model)(START)).ms)
    const { gap, expectedCost } = nextAction(model, START)
    row.gaps.push(gap / expectedCost)
  }
}

function price({ jobs, list, row }: Sized): void {
  for (const model of list)
    if (jobs === 0) priceExactly(model, row)
    else priceByJobs(model, quick ? Math.min(2, jobs) : jobs, row)
}

function cellsOf({ faults, checks, jobs, row }: Sized): string[] {
  const exact = row.gaps.filter((gap) => gap === 0).length
  const priced =
    jobs === 0 ? priceCells(row) : [`${percent(mean(row.above))} against the rule`, '-']
  return [
    `${faults} x ${checks}`,
    `${at(row.first, 0.5).toFixed(1)}, ${at(row.first, 0.95).toFixed(1)}, ${most(row.first).toFixed(1)} ms`,
    `${(at(row.first, 0.5) / at(row.rule, 0.5)).toFixed(1)} x`,
    `${exact} of ${row.gaps.length}, mean gap ${percent(mean(row.gaps))}`,
    ...priced,
    `${row.gaps.length}`,
  ]
}

const priceCells = (row: Row): string[] =>
  [row.above, row.ruleAbove].map((xs) => `${percent(mean(xs))}, worst ${percent(most(xs))}`)

/** Both policies through the whole tree, against the optimum. */
function priceExactly(model: SingleModel, row: Row): void {
  const optimum = nextAction(model, START, PATIENT)
  if (optimum.gap > 0) return
  row.above.push(treeCost(model, enginePolicy(model)) / optimum.expectedCost - 1)
  row.ruleAbove.push(treeCost(model, oneStep(model)) / optimum.expectedCost - 1)
}

/** Both policies on the same invented jobs: what the engine's cost more or less than the rule's. */
function priceByJobs(model: SingleModel, jobs: number, row: Row): void {
  const [ours, plain] = [enginePolicy(model), oneStep(model)]
  const costs = { ours: 0, plain: 0 }
  for (let job = 1; job <= jobs; job++) {
    costs.ours += simulatedCost(model, ours, job)
    costs.plain += simulatedCost(model, plain, job)
  }
  row.above.push(costs.ours / costs.plain - 1)
}

function noisy(faults: number, seed: number): NoisyOrModel {
  const random = randomFrom(seed)
  const ids = Array.from({ length: faults }, (_, i) => `f${i}`)
  const findings = Array.from({ length: 8 }, (_, i) => ({
    id: `s${i}`,
    leak: 0.01 + 0.05 * random(),
    links: Object.fromEntries(ids.filter(() => random() < 0.4).map((id) => [id, random()])),
  }))
  const evidence = Object.fromEntries(
    findings.map(({ id }) => [id, random() < 0.5 ? (1 as const) : (0 as const)]),
  )
  const priors = ids.map((id) => ({ id, prior: 0.01 + 0.3 * random() }))
  return { kind: 'noisyor', condition: 'atLeastOne', faults: priors, findings, evidence }
}

function marginalRow(faults: number): string[] {
  const ours: number[] = []
  const brute: number[] = []
  let off = 0
  for (let seed = 1; seed <= (quick ? 2 : 9); seed++) {
    const model = noisy(faults, seed)
    marginals(model)
    const mine = timed(() => marginals(model))
    const plain = timed(() => bruteMarginals(model))
    ours.push(mine.ms)
    brute.push(plain.ms)
    for (const [id, p] of Object.entries(plain.value ?? {}))
      off = Math.max(off, Math.abs(p - (mine.value[id] ?? Number.NaN)))
  }
  const ratio = at(brute, 0.5) / at(ours, 0.5)
  return [
    `${faults}`,
    `${at(ours, 0.5).toFixed(2)} ms`,
    `${at(brute, 0.5).toFixed(2)} ms, ${ratio.toFixed(1)} x`,
    off.toExponential(1),
    `${ours.length}`,
  ]
}

function main(): void {
  const facts = machineFacts()
  const cold = timed(() => nextAction(inventedModel('imperfect', COLD, 1), START)).ms
  const sizes = SIZES.map((size): Sized => ({ ...size, list: modelsOf(size), row: emptyRow() }))
  for (const size of sizes) time(size)
  const decisions = sizes.map((size) => {
    price(size)
    const cells = cellsOf(size)
    console.log(cells.join(' | '))
    return cells
  })
  const chances = (quick ? [8] : [8, 12, 16]).map(marginalRow)
  for (const cells of chances) console.log(cells.join(' | '))
  const body = [
    table(
      [
        'suspects x checks',
        'first decision: p50, p95, most',
        'over the one-step rule',
        'exact',
        'cost above the optimum',
        'one-step rule above it',
        'n',
      ],
      decisions,
    ),
    '',
    `Each model's decision ${TIMES} times, once it has been made before. The very first decision of the process, ${COLD.faults} x ${COLD.checks}: ${cold.toFixed(0)} ms.`,
    '',
    table(['faults', 'marginals', 'brute force', 'furthest apart', 'n'], chances),
  ].join('\n')
  if (!quick)
    writePart({ name: 'bench:diag', facts: ['Command: `npm run bench:diag`', ...facts], body })
}

main()
