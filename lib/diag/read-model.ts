/** Reads a file of the engine's own models (engine.md 2.1): a bad one is answered with the field and a sentence. */
import * as z from 'zod/mini'
import { ok, type Result } from '@/lib/model/result'
import { type Bad, bad, type ModelProblem, short, strangeName } from './model-names'
import { noisyOr, single, state } from './model-shapes'
import type { NoisyOrModel, SearchState, SingleModel } from './troubleshoot-model'

/** A file that was read, and what was found in it beside the model. */
export type ModelFile = {
  model: SingleModel | NoisyOrModel
  state: SearchState | null
  /** Fields nobody knows: left alone, and said so. */
  notices: string[]
}

/** Fields beside the model that a file may hold without a notice. */
const BESIDE = ['state', 'answer']

/**
 * The model in a parsed JSON file, with its state when it has one. `badModel` names the first field that is wrong.
 * Records of the model have no prototype: any word may be an id but `__proto__`, which JavaScript keeps to itself.
 */
export function readModel(json: unknown): Result<ModelFile, ModelProblem> {
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    return bad('the file', 'must be one JSON object')
  const kept = keptWord(json)
  if (kept !== null) return bad(kept, 'cannot be used as a name')
  const { kind, state: given } = json as Record<string, unknown>
  if (kind !== 'single' && kind !== 'noisyor') return bad('kind', 'must be "single" or "noisyor"')
  const parsed = kind === 'single' ? z.safeParse(single, json) : z.safeParse(noisyOr, json)
  if (!parsed.success) return issueOf(parsed.error.issues)
  const model = bare(parsed.data) as SingleModel | NoisyOrModel
  const parsedState = given === undefined ? null : z.safeParse(state, given)
  if (parsedState !== null && !parsedState.success)
    return issueOf(parsedState.error.issues, 'state')
  const at = parsedState === null ? null : (bare(parsedState.data) as SearchState)
  const strange = strangeName(model, at)
  if (strange !== null) return strange
  const unknown = [
    ...leftAlone(json, parsed.data).filter((field) => !BESIDE.includes(field)),
    ...(parsedState === null ? [] : leftAlone(given, parsedState.data, 'state')),
  ]
  return ok({ model, state: at, notices: noticesOf([...new Set(unknown)]) })
}

/** Notices shown one by one; of more only their number is said. */
const MOST_NOTICES = 20

function noticesOf(fields: readonly string[]): string[] {
  const shown = fields
    .slice(0, MOST_NOTICES)
    .map((field) => `The field "${short(field)}" is not known and was left alone.`)
  const more = fields.length - shown.length
  return more > 0 ? [...shown, `${more} more fields are not known and were left alone.`] : shown
}

/** The fields of a file that its shape does not know: those that parsing left out, at any depth, lists as one. */
function leftAlone(given: unknown, kept: unknown, under = ''): string[] {
  if (!isRecord(given) || !isRecord(kept)) return []
  return Object.keys(given).flatMap((key) => {
    const at = Array.isArray(given) ? under : under === '' ? key : `${under}.${key}`
    return Object.hasOwn(kept, key) ? leftAlone(given[key], kept[key], at) : [at]
  })
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null

type Place = { value: unknown; key: string; under: Place | null }

/** Where the one word that no record can hold stands as a key or as an id; null when it does not. */
function keptWord(json: object): string | null {
  const open: Place[] = [{ value: json, key: '', under: null }]
  for (let at = open.pop(); at !== undefined; at = open.pop()) {
    if (at.key === '__proto__' || at.value === '__proto__') return pathOf(at)
    if (typeof at.value !== 'object' || at.value === null) continue
    for (const [key, value] of Object.entries(at.value)) open.push({ value, key, under: at })
  }
  return null
}

function pathOf(place: Place): string {
  const keys: string[] = []
  for (let at: Place | null = place; at?.under != null; at = at.under) keys.unshift(at.key)
  return keys.join('.')
}

/** The same data with records that answer to their own keys only. */
function bare(data: unknown): unknown {
  if (Array.isArray(data)) return data.map(bare)
  if (typeof data !== 'object' || data === null) return data
  const copy = Object.create(null) as Record<string, unknown>
  for (const [key, value] of Object.entries(data)) copy[key] = bare(value)
  return copy
}

type Issue = {
  path: readonly PropertyKey[]
  origin?: unknown
  code?: string | undefined
  expected?: unknown
  minimum?: unknown
  maximum?: unknown
  values?: readonly unknown[]
  message?: string
}

function issueOf(issues: readonly Issue[], under = ''): Bad {
  const issue = issues[0]
  const path = [under, ...(issue?.path ?? [])].filter((p) => p !== '').map(String)
  return bad(path.join('.') || 'the file', issue === undefined ? 'is not right' : wordsOf(issue))
}

function wordsOf({ code, expected, minimum, maximum, values, origin, message }: Issue): string {
  if (code === 'invalid_type') return `must be ${KINDS[String(expected)] ?? 'of another kind'}`
  // Both unions of the shapes say themselves what they may be.
  if (code === 'invalid_union') return message ?? 'must be of another kind'
  if (code === 'too_small' && origin === 'string') return 'must not be empty'
  if (code === 'too_big' && origin === 'string')
    return `must have ${String(maximum)} letters at most`
  if (code === 'too_small' && origin === 'array')
    return `must have ${String(minimum)} or more in it`
  if (code === 'too_small') return `must be at least ${String(minimum)}`
  if (code === 'too_big') return `must be at most ${String(maximum)}`
  if (values !== undefined) return `must be one of ${values.map(String).join(', ')}`
  return 'does not have one of the forms it may have'
}

/** What a field may be asked to be, by the schema's own words. */
const KINDS: Readonly<Record<string, string>> = {
  array: 'a list',
  boolean: 'true or false',
  number: 'a number',
  object: 'an object',
  record: 'an object',
  string: 'a string',
}
