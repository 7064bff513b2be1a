/**
 * Figures of a `single` model and of a state that cannot be, found before anything is reckoned from them. Files
 * come through read-model.ts; this is for models that are made in memory, so that a price that is no number
 * cannot make an action vanish in silence (rule [E6] of docs/spec/diag.md).
 */
import { AppError } from '@/lib/model/result'
import type { SearchState, SingleModel } from './troubleshoot-model'

/** How far a row of chances may be from 1 in all: rounding of a file. */
export const ROW_SLACK = 1e-6

/**
 * Breaks off (AppError `badModel`, with the field in its context) at the first figure that cannot be: costs and
 * minutes are finite and not below 0, chances lie within 0 and 1, rows sum to 1 with one chance per outcome, priors
 * are not below 0 and not all 0. What a stop costs more for a fault may be below 0. A row left out is even.
 */
export function mustBeFigures(model: SingleModel, state: SearchState): void {
  amount('ratePerMinute', model.ratePerMinute)
  let priors = 0
  for (const { id, prior, repair } of model.faults) {
    priors += amount(`faults.${id}.prior`, prior)
    if (repair === null) continue
    priced(`faults.${id}.repair`, repair)
    chance(`faults.${id}.repair.success`, repair.success ?? 1)
  }
  if (!(priors > 0)) throw wrong('faults')
  for (const repair of model.extraRepairs ?? []) {
    priced(`extraRepairs.${repair.id}`, repair)
    chances(`extraRepairs.${repair.id}.fixes`, repair.fixes)
  }
  for (const check of model.checks) mustBeCheck(check)
  for (const setup of model.setups ?? []) priced(`setups.${setup.id}`, setup)
  for (const stop of model.stops) mustBeStop(stop)
  if (model.verify !== undefined) mustBeTest(model.verify)
  if (model.daylight !== undefined) amount('daylight.minutes', model.daylight.minutes)
  amount('state.elapsed', state.elapsed)
}

function mustBeCheck(check: SingleModel['checks'][number]): void {
  const at = `checks.${check.id}`
  priced(at, check)
  for (const [fault, row] of Object.entries(check.p)) {
    const sum = row.reduce((total, p, o) => total + amount(`${at}.p.${fault}.${o}`, p), 0)
    const fits = row.length === check.outcomes.length && Math.abs(sum - 1) <= ROW_SLACK
    if (!fits) throw wrong(`${at}.p.${fault}`)
  }
}

function mustBeStop({ id, cost, minutes, costByFault }: SingleModel['stops'][number]): void {
  priced(`stops.${id}`, { cost, minutes: minutes ?? 0 })
  for (const [fault, extra] of Object.entries(costByFault ?? {}))
    if (!Number.isFinite(extra)) throw wrong(`stops.${id}.costByFault.${fault}`)
}

function mustBeTest(test: NonNullable<SingleModel['verify']>): void {
  priced('verify', test)
  amount('verify.comebackCost', test.comebackCost ?? 0)
  if (typeof test.falsePass === 'object') chances('verify.falsePass', test.falsePass)
  else chance('verify.falsePass', test.falsePass ?? 0)
}

const wrong = (field: string): AppError => new AppError('badModel', { context: { field } })

function amount(field: string, value: number): number {
  if (!(Number.isFinite(value) && value >= 0)) throw wrong(field)
  return value
}

function chance(field: string, value: number): number {
  if (!(value >= 0 && value <= 1)) throw wrong(field)
  return value
}

const chances = (field: string, byFault: Readonly<Record<string, number>>): void => {
  for (const [fault, value] of Object.entries(byFault)) chance(`${field}.${fault}`, value)
}

function priced(field: string, { cost, minutes }: { cost?: number; minutes: number }): void {
  amount(`${field}.cost`, cost ?? 0)
  amount(`${field}.minutes`, minutes)
}
