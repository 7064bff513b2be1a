/** Reads a file of the engine's own models (engine.md 2.1): a bad one is answered with the field and a sentence. */
import * as z from 'zod/mini'
import { ok, type Result } from '@/lib/model/result'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

export type ModelProblem = { kind: 'badModel'; field: string; sentence: string }
export type ModelFile = {
  model: SingleModel | NoisyOrModel
  state: SearchState | null
  /** Fields nobody knows: left alone, and said so. */
  notices: string[]
}

const name = z.string().check(z.minLength(1))
const amount = z.number().check(z.minimum(0))
const chance = z.number().check(z.minimum(0), z.maximum(1))
const names = z.array(name)
const repair = z.object({
  cost: amount,
  minutes: amount,
  setup: names,
  needsPart: z.optional(name),
  success: z.optional(chance),
})
const single = z.object({
  id: z.optional(name),
  kind: z.literal('single'),
  ratePerMinute: amount,
  faults: z
    .array(z.object({ id: name, prior: amount, repair: z.nullable(repair) }))
    .check(z.minLength(1)),
  extraRepairs: z.optional(
    z.array(
      z.object({
        id: name,
        cost: amount,
        minutes: amount,
        setup: names,
        needsPart: z.optional(name),
        fixes: z.record(name, chance),
      }),
    ),
  ),
  parts: z.optional(z.object({ onHand: names })),
  checks: z.array(
    z.object({
      id: name,
      cost: amount,
      minutes: amount,
      setup: names,
      outcomes: z.array(name).check(z.minLength(2)),
      p: z.record(name, z.array(chance)),
    }),
  ),
  setups: z.optional(
    z.array(
      z.object({
        id: name,
        cost: z.optional(amount),
        minutes: amount,
        requires: names,
        closedByTest: z.boolean(),
      }),
    ),
  ),
  verify: z.optional(
    z.object({
      cost: amount,
      minutes: amount,
      falsePass: z.optional(z.union([chance, z.record(name, chance)])),
      comebackCost: z.optional(amount),
    }),
  ),
  stops: z.array(
    z.object({
      id: name,
      cost: amount,
      minutes: z.optional(amount),
      costByFault: z.optional(z.record(name, z.number())),
    }),
  ),
  daylight: z.optional(z.object({ minutes: amount })),
})
const noisyOr = z.object({
  id: z.optional(name),
  kind: z.literal('noisyor'),
  condition: z.enum(['none', 'atLeastOne']),
  faults: z.array(z.object({ id: name, prior: chance })).check(z.minLength(1)),
  findings: z.array(z.object({ id: name, leak: chance, links: z.record(name, chance) })),
  evidence: z.record(
    name,
    z.union([z.literal(0), z.literal(1), z.object({ virtual: z.tuple([amount, amount]) })]),
  ),
})
const state = z.object({
  evidence: z.record(name, name),
  tried: names,
  open: names,
  elapsed: amount,
})

/** Fields beside the model that a file may hold without a notice. */
const BESIDE = ['state', 'answer']

/** The model in a parsed JSON file, with its state when it has one. `badModel` names the first field that is wrong. */
export function readModel(json: unknown): Result<ModelFile, ModelProblem> {
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    return bad('the file', 'must be one JSON object')
  const { kind, state: given } = json as Record<string, unknown>
  if (kind !== 'single' && kind !== 'noisyor') return bad('kind', 'must be "single" or "noisyor"')
  const parsed = kind === 'single' ? z.safeParse(single, json) : z.safeParse(noisyOr, json)
  if (!parsed.success) return issueOf(parsed.error.issues)
  const model = parsed.data as SingleModel | NoisyOrModel
  const parsedState = given === undefined ? null : z.safeParse(state, given)
  if (parsedState !== null && !parsedState.success)
    return issueOf(parsedState.error.issues, 'state')
  const at = parsedState?.data ?? null
  const strange = strangeName(model, at)
  return strange ?? ok({ model, state: at, notices: noticesOf(json, model.kind) })
}

function strangeName(model: SingleModel | NoisyOrModel, at: SearchState | null): Bad | null {
  if (model.kind === 'noisyor') return badLink(model)
  return badName(model) ?? (at === null ? null : badState(model, at))
}

function noticesOf(json: object, kind: 'single' | 'noisyor'): string[] {
  const known = kind === 'single' ? single.shape : noisyOr.shape
  return Object.keys(json)
    .filter((key) => !(key in known) && !BESIDE.includes(key))
    .map((key) => `The field "${key}" is not known and was left alone.`)
}

type Bad = { ok: false; problem: ModelProblem }

function bad(field: string, sentence: string): Bad {
  return { ok: false, problem: { kind: 'badModel', field, sentence: `"${field}" ${sentence}.` } }
}

type Issue = {
  path: readonly PropertyKey[]
  code?: string | undefined
  expected?: unknown
  minimum?: unknown
  maximum?: unknown
  values?: readonly unknown[]
}

function issueOf(issues: readonly Issue[], under = ''): Bad {
  const issue = issues[0]
  const path = [under, ...(issue?.path ?? [])].filter((p) => p !== '').map(String)
  return bad(path.join('.') || 'the file', issue === undefined ? 'is not right' : wordsOf(issue))
}

function wordsOf({ code, expected, minimum, maximum, values }: Issue): string {
  if (code === 'invalid_type') return `must be a ${String(expected)}`
  if (code === 'too_small') return `must be at least ${String(minimum)}`
  if (code === 'too_big') return `must be at most ${String(maximum)}`
  if (values !== undefined) return `must be one of ${values.map(String).join(', ')}`
  return 'does not have one of the forms it may have'
}

/** Names in a state that the model does not have. */
function badState(model: SingleModel, given: SearchState): Bad | null {
  for (const [id, outcome] of Object.entries(given.evidence)) {
    const check = model.checks.find((c) => c.id === id)
    if (check === undefined) return bad(`state.evidence.${id}`, 'names a check that is not listed')
    if (!check.outcomes.includes(outcome))
      return bad(`state.evidence.${id}`, `names an outcome "${outcome}" that the check has not`)
  }
  const repairs = [...model.faults, ...(model.extraRepairs ?? [])].map((r) => r.id)
  const stranger = given.tried.find((id) => !repairs.includes(id))
  if (stranger !== undefined)
    return bad('state.tried', `names a repair "${stranger}" that is not listed`)
  const shut = given.open.find((id) => !(model.setups ?? []).some((s) => s.id === id))
  return shut === undefined
    ? null
    : bad('state.open', `names a set-up "${shut}" that is not listed`)
}

/** Names that do not exist, twice the same, and rows that do not fit. */
function badName(model: SingleModel): Bad | null {
  const faults = model.faults.map((f) => f.id)
  const setups = new Set((model.setups ?? []).map((s) => s.id))
  const twice = doubled([...faults, ...(model.extraRepairs ?? []).map((r) => r.id)])
  if (twice !== null) return bad(`faults.${twice}`, 'stands there twice')
  if (!(model.faults.reduce((sum, f) => sum + f.prior, 0) > 0))
    return bad('faults', 'must have priors above 0')
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
    if (missing !== undefined) return bad(at, `names a set-up "${missing}" that is not listed`)
  }
  return badRow(model, faults)
}

function badRow(model: SingleModel, faults: readonly string[]): Bad | null {
  const twice = doubled(model.checks.map((c) => c.id))
  if (twice !== null) return bad(`checks.${twice}`, 'stands there twice')
  for (const check of model.checks)
    for (const fault of faults) {
      const row = check.p[fault]
      const at = `checks.${check.id}.p.${fault}`
      if (row === undefined) return bad(at, 'is missing')
      if (row.length !== check.outcomes.length)
        return bad(at, `must have ${check.outcomes.length} chances, one per outcome`)
      const sum = row.reduce((total, p) => total + p, 0)
      if (Math.abs(sum - 1) > 1e-6) return bad(at, `must sum to 1, not ${sum}`)
    }
  return null
}

function badLink(model: NoisyOrModel): Bad | null {
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

const doubled = (ids: readonly string[]): string | null =>
  ids.find((id, i) => ids.indexOf(id) !== i) ?? null
