/** Names in a model file that do not exist or stand twice, and rows that do not fit: one sentence with the field. */
import { ROW_SLACK } from './model-figures'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

/** What is wrong with a model file: the field, and a sentence that names it. */
export type ModelProblem = { kind: 'badModel'; field: string; sentence: string }
/** The answer for a file that is wrong. */
export type Bad = { ok: false; problem: ModelProblem }

/** A problem with a field, in a sentence. */
export function bad(field: string, sentence: string): Bad {
  const shown = short(field)
  return {
    ok: false,
    problem: { kind: 'badModel', field: shown, sentence: `"${shown}" ${sentence}.` },
  }
}

/** A word of the file as a sentence can bear it. */
export const short = (word: string): string =>
  word.length > 120 ? `${word.slice(0, 117)}...` : word

/** The first name or row of a model and its state that does not fit; null when all do. */
export function strangeName(model: SingleModel | NoisyOrModel, at: SearchState | null): Bad | null {
  if (model.kind === 'noisyor') return badLink(model)
  return badName(model) ?? (at === null ? null : badState(model, at))
}

/** Names in a state that the model does not have. */
function badState(model: SingleModel, given: SearchState): Bad | null {
  for (const [id, outcome] of Object.entries(given.evidence)) {
    const check = model.checks.find((c) => c.id === id)
    if (check === undefined) return bad(`state.evidence.${id}`, 'names a check that is not listed')
    if (!check.outcomes.includes(outcome))
      return bad(
        `state.evidence.${id}`,
        `names an outcome "${short(outcome)}" that the check has not`,
      )
  }
  const repairs = [...model.faults, ...(model.extraRepairs ?? [])].map((r) => r.id)
  const stranger = given.tried.find((id) => !repairs.includes(id))
  if (stranger !== undefined)
    return bad('state.tried', `names a repair "${short(stranger)}" that is not listed`)
  const shut = given.open.find((id) => !(model.setups ?? []).some((s) => s.id === id))
  return shut === undefined
    ? null
    : bad('state.open', `names a set-up "${short(shut)}" that is not listed`)
}

/** Names that do not exist, twice the same, and rows that do not fit. */
function badName(model: SingleModel): Bad | null {
  const faults = model.faults.map((f) => f.id)
  const setups = new Set((model.setups ?? []).map((s) => s.id))
  const twice = doubled([...faults, ...(model.extraRepairs ?? []).map((r) => r.id)])
  if (twice !== null) return bad(`faults.${twice}`, 'stands there twice')
  const stopTwice = doubled(model.stops.map((s) => s.id))
  if (stopTwice !== null) return bad(`stops.${stopTwice}`, 'stands there twice')
  const setupTwice = doubled((model.setups ?? []).map((s) => s.id))
  if (setupTwice !== null) return bad(`setups.${setupTwice}`, 'stands there twice')
  if (setups.size > MOST_SETUPS) return bad('setups', `must be ${MOST_SETUPS} at most`)
  const stranger = strangerIn(model, new Set(faults))
  if (stranger !== null) return bad(stranger, 'names a fault that is not listed')
  if (!(model.faults.reduce((sum, f) => sum + f.prior, 0) > 0))
    return bad('faults', 'must have priors above 0')
  const unset = strangeSetup(model, setups)
  if (unset !== null) return unset
  const ring = (model.setups ?? []).find(({ id }) => leadsTo(model, id, id))
  if (ring !== undefined) return bad(`setups.${ring.id}.requires`, 'leads back to itself')
  return badRow(model, faults)
}

/** A set-up that something asks for and that is not there. */
function strangeSetup(model: SingleModel, setups: ReadonlySet<string>): Bad | null {
  const needs = [
    ...model.faults.map((f) => ({
      at: `faults.${f.id}.repair.setup`,
      setup: f.repair?.setup ?? [],
    })),
    ...(model.extraRepairs ?? []).map((r) => ({
      at: `extraRepairs.${r.id}.setup`,
      setup: r.setup,
    })),
    ...model.checks.map((c) => ({ at: `checks.${c.id}.setup`, setup: c.setup })),
    ...(model.setups ?? []).map((s) => ({ at: `setups.${s.id}.requires`, setup: s.requires })),
  ]
  for (const { at, setup } of needs) {
    const missing = setup.find((id) => !setups.has(id))
    if (missing !== undefined)
      return bad(at, `names a set-up "${short(missing)}" that is not listed`)
  }
  return null
}

/** Whether opening a set-up asks for another one, straight or by what it requires. */
function leadsTo({ setups = [] }: SingleModel, from: string, wanted: string): boolean {
  const seen = new Set<string>()
  const open = [from]
  for (let at = open.pop(); at !== undefined; at = open.pop())
    for (const next of setups.find((s) => s.id === at)?.requires ?? []) {
      if (next === wanted) return true
      if (!seen.has(next)) open.push(next)
      seen.add(next)
    }
  return false
}

/** Set-ups are kept as bits of one number (search-problem.ts). */
const MOST_SETUPS = 30

/** A record by fault that names one that is not there. */
function strangerIn(model: SingleModel, faults: ReadonlySet<string>): string | null {
  const falsePass = model.verify?.falsePass
  const records: [string, object][] = [
    ...(model.extraRepairs ?? []).map((r): [string, object] => [
      `extraRepairs.${r.id}.fixes`,
      r.fixes,
    ]),
    ...model.checks.map((c): [string, object] => [`checks.${c.id}.p`, c.p]),
    ...model.stops.map((s): [string, object] => [`stops.${s.id}.costByFault`, s.costByFault ?? {}]),
    ['verify.falsePass', typeof falsePass === 'object' ? falsePass : {}],
  ]
  for (const [at, record] of records)
    for (const fault of Object.keys(record)) if (!faults.has(fault)) return `${at}.${fault}`
  return null
}

function badRow(model: SingleModel, faults: readonly string[]): Bad | null {
  const twice = doubled(model.checks.map((c) => c.id))
  if (twice !== null) return bad(`checks.${twice}`, 'stands there twice')
  for (const check of model.checks) {
    const same = doubled(check.outcomes)
    if (same !== null) return bad(`checks.${check.id}.outcomes.${same}`, 'stands there twice')
    for (const fault of faults) {
      const row = check.p[fault]
      const at = `checks.${check.id}.p.${fault}`
      if (row === undefined) return bad(at, 'is missing')
      if (row.length !== check.outcomes.length)
        return bad(at, `must have ${check.outcomes.length} chances, one per outcome`)
      const sum = row.reduce((total, p) => total + p, 0)
      if (Math.abs(sum - 1) > ROW_SLACK) return bad(at, `must sum to 1, not ${sum}`)
    }
  }
  return null
}

function badLink(model: NoisyOrModel): Bad | null {
  const faultTwice = doubled(model.faults.map((f) => f.id))
  if (faultTwice !== null) return bad(`faults.${faultTwice}`, 'stands there twice')
  const findingTwice = doubled(model.findings.map((f) => f.id))
  if (findingTwice !== null) return bad(`findings.${findingTwice}`, 'stands there twice')
  const faults = new Set(model.faults.map((f) => f.id))
  const findings = new Set(model.findings.map((f) => f.id))
  for (const finding of model.findings) {
    const stranger = Object.keys(finding.links).find((f) => !faults.has(f))
    if (stranger !== undefined)
      return bad(`findings.${finding.id}.links.${stranger}`, 'names a fault that is not listed')
  }
  const unseen = Object.keys(model.evidence).find((f) => !findings.has(f))
  return unseen === undefined
    ? null
    : bad(`evidence.${unseen}`, 'names a finding that is not listed')
}

function doubled(ids: readonly string[]): string | null {
  const seen = new Set<string>()
  for (const id of ids) {
    if (seen.has(id)) return id
    seen.add(id)
  }
  return null
}
