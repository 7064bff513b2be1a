/**
 * A reading as evidence: the density of what was read given each state, the true value spread evenly over the
 * book's pieces and blurred by the uncertainty of meter and leads, with an outlier floor so that no single
 * reading sets a suspect to nought. With several affecting faults present the mean of their densities speaks.
 * A good twin read with the same meter comes first (rules R7, R17): when the two agree and the meter cannot
 * decide the figure, the check says nothing; else the difference is the evidence, for it sheds what both share.
 */
import type { CheckItem, Piece } from '@/lib/model/code-book'
import type { LogEntry, ReadingBody } from '@/lib/model/log-entry'
import type { SpecValue } from '@/lib/model/machine-model'
import { twinKey } from './evidence-log'
import { type Evidence, nothing, type Sight, stillThere, tableAt, tableOf } from './evidence-table'
import { type Factor, tableFactor } from './factor'
import { meanMachine, runMachine } from './machine'
import { between, density as normalDensity } from './normal'
import { canDecide, judge, middleOf } from './reading'
import { budgetOf } from './reading-budget'
import { problemWords, readingProblem } from './reading-problem'
import { agrees, differenceU } from './twin-difference'

/** Share of readings that have nothing to do with the part (slipped probe, wrong pin; guess). */
const OUTLIERS = 0.02
/** Such a reading lies anywhere within five nominal values, or thins out beyond (guess): 1 in 20 per nominal. */
const ANYWHERE = 1 / 20
/** A piece of the true value narrower than this share of u counts as a point (right to 1e-6 within 5 u). */
const NARROW = 1e-3
/** However far out a reading lies, it keeps a likelihood: below this it tells the states apart no more. */
const LEAST = 1e-60

type Model = NonNullable<CheckItem['reading']>
type Shown = { at: number; standardU: number; overRange: boolean }

/** The evidence of a reading; a known-good one only speaks through the suspect's. */
export function readingEvidence(
  sight: Sight,
  entry: LogEntry,
  { body, at }: { body: ReadingBody; at: number },
): Evidence {
  const check = sight.c.index.checks.get(body.checkId)
  const label = `${check?.name ?? body.checkId}: ${body.asTyped} ${body.unit}`
  if (body.subject === 'knownGood') return nothing(entry, 'reading', `${label} on a known-good one`)
  const problem = readingProblem(body)
  if (problem !== null) return nothing(entry, 'reading', `${label}: ${problemWords(problem)}`)
  if (check === undefined) return nothing(entry, 'reading', label)
  if (isOfWithdrawnLimit(sight, body))
    return nothing(entry, 'reading', `${label}: its limit was withdrawn`)
  const twin = twinOf(sight, body)
  const model = check.reading
  const nominal = model === null ? null : nominalOf(body.spec, model)
  if (isShedByTwin(sight, body))
    return nothing(entry, 'reading', `${label}: a good one reads the same, so it says nothing`)
  if (model === null || nominal === null)
    return {
      ...nothing(entry, 'reading', label),
      factor: verdictFactor(sight, check, { body, at }),
    }
  const shown = twin === null ? shownBy(body) : againstTwin(body, twin, { model, nominal })
  return {
    ...nothing(entry, 'reading', label),
    factor: densityFactor(sight, model, { shown, nominal, at }),
  }
}

/** Whether it was read against a limit of the book's own that was withdrawn since (rule R23). */
function isOfWithdrawnLimit({ c }: Sight, { checkId, spec }: ReadingBody): boolean {
  const gone = c.index.withdrawnLimits.get(checkId)
  if (gone === undefined || spec === null || spec.nominal !== null) return false
  return spec.low === gone.low && spec.high === gone.high && spec.source === gone.source
}

/** Whether a good twin reads the same and the meter cannot decide the figure: then the check says nothing. */
export function isShedByTwin(sight: Sight, body: ReadingBody): boolean {
  const twin = readingProblem(body) === null ? twinOf(sight, body) : null
  return twin !== null && agrees(body, twin) && !decides(body)
}

/** The value the pieces are factors of: the sheet's nominal, the middle of its limits, else the book's fallback; never 0. */
export function nominalOf(spec: SpecValue | null, model: Model): number | null {
  const { low = null, high = null } = model.fallback ?? {}
  const both = low !== null && high !== null ? (low + high) / 2 : null
  const value = middleOf(spec) ?? both ?? low ?? high
  return value === 0 ? null : value
}

/** The living twin reading of the same check and quantity, the latest; null without one that can be. */
function twinOf({ log }: Sight, body: ReadingBody): ReadingBody | null {
  const twin = log.twins.get(twinKey(body))
  return twin === undefined || readingProblem(twin) !== null ? null : twin
}

/** Likelihood of a shown value under a state, in units of 1 / nominal, with the floor; a chance over range. */
export function likelihood(pieces: readonly Piece[], shown: Shown, nominal: number): number {
  const size = Math.abs(nominal)
  if (shown.overRange)
    return (1 - OUTLIERS) * tail(pieces, shown.at / nominal) + OUTLIERS * ANYWHERE
  const x = shown.at / nominal
  const u = Math.max(shown.standardU / size, 1e-9)
  const far = Math.abs(x) <= 5 ? 1 : (5 / Math.abs(x)) ** 2
  return (1 - OUTLIERS) * density(pieces, x, u) + Math.max(LEAST, OUTLIERS * far * ANYWHERE)
}

function densityFactor(
  sight: Sight,
  model: Model,
  { shown, nominal, at }: { shown: Shown; nominal: number; at: number },
): Factor {
  const good = likelihood(model.good, shown, nominal)
  const bad = new Map<number, number>()
  for (const [fault, pieces] of Object.entries(model.byFault)) {
    const place = sight.place.get(fault)
    if (place === undefined) continue
    const there = stillThere(sight, fault, at)
    bad.set(place, there * likelihood(pieces, shown, nominal) + (1 - there) * good)
  }
  const machine = meanMachine(good, bad)
  return { scope: [...bad.keys()], at: (present) => runMachine(machine, present), machine }
}

const weightOf = (pieces: readonly Piece[]): number => pieces.reduce((sum, p) => sum + p.weight, 0)

function density(pieces: readonly Piece[], x: number, u: number): number {
  if (pieces.length === 0) return ANYWHERE
  const sum = pieces.reduce((total, { weight, from, to }) => {
    const [a, b] = [(from - x) / u, (to - x) / u]
    // A piece that is narrow beside u is a point: between its ends the digits would cancel.
    const isPoint = to - from < NARROW * u
    const high = isPoint ? normalDensity((a + b) / 2) / u : between(a, b) / (to - from)
    return total + weight * high
  }, 0)
  return sum / weightOf(pieces)
}

function tail(pieces: readonly Piece[], x: number): number {
  if (pieces.length === 0) return ANYWHERE
  const sum = pieces.reduce((total, { weight, from, to }) => {
    const width = to - from
    const above = width > 0 ? Math.min(1, Math.max(0, (to - x) / width)) : from > x ? 1 : 0
    return total + weight * above
  }, 0)
  return sum / weightOf(pieces)
}

function shownBy(body: ReadingBody): Shown {
  const { estimate, standardU } = budgetOf(body)
  return { at: estimate, standardU, overRange: body.overRange }
}

/** The suspect's value as the twin shows it: the middle of the good state plus the difference. */
function againstTwin(
  body: ReadingBody,
  twin: ReadingBody,
  { model, nominal }: { model: Model; nominal: number },
): Shown {
  if (body.overRange || twin.overRange || model.good.length === 0) return shownBy(body)
  const total = weightOf(model.good)
  const mean = model.good.reduce((s, p) => s + (p.weight * (p.from + p.to)) / 2, 0) / total
  const variance =
    model.good.reduce((s, p) => {
      const middle = (p.from + p.to) / 2
      return s + p.weight * ((middle - mean) ** 2 + (p.to - p.from) ** 2 / 12)
    }, 0) / total
  const apart = budgetOf(body).estimate - budgetOf(twin).estimate
  const standardU = Math.hypot(differenceU(body, twin), Math.sqrt(variance) * nominal)
  return { at: mean * nominal + apart, standardU, overRange: false }
}

/** Without a model of the true value the three-valued verdict enters as virtual evidence on the outcome table. */
function verdictFactor(
  sight: Sight,
  check: CheckItem,
  { body, at }: { body: ReadingBody; at: number },
): Factor | null {
  const { verdict, conformance } = judge(body)
  if (verdict === null) return null
  const named = check.outcomes.findIndex((o) => o.id === verdict)
  const chance = conformance ?? 0.5
  const weights = check.outcomes.map((o, k) => {
    if (named >= 0) return k === named ? 1 : 0
    return o.good ? chance : 1 - chance
  })
  return tableFactor(tableAt(sight, tableOf(sight.place, check), at), weights)
}

const decides = (body: ReadingBody): boolean => canDecide(body).decides
