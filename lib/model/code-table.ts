import * as z from 'zod/mini'
import { slug } from './id'
import { sentence, source } from './sentence'

/** Shapes of the code book's tables: codes, failure kinds, set-ups and words. */

/** What a fault is to the circuit a code names. */
export const CIRCUIT_ROLES = ['part', 'wiring', 'supply', 'driver', 'sensor', 'mechanism'] as const
export const circuitRole = z.enum(CIRCUIT_ROLES)
export type CircuitRole = z.infer<typeof circuitRole>

/**
 * What a code tells of faults without a look at any circuit: a condition, as a misfire or too little pressure. Of 100
 * machines that log codes and have this fault and no other, how many set it; `otherwise` with none of them. Codes
 * that tell the same story share `id`, and together count once. `fmis`: the kinds it holds for; null: whatever kind.
 */
export const codeTells = z.strictObject({
  id: slug,
  fmis: z.nullable(z.array(z.int().check(z.minimum(0), z.maximum(31))).check(z.minLength(1))),
  of100: z.record(slug, z.number().check(z.positive(), z.maximum(99))),
  otherwise: z.number().check(z.positive(), z.maximum(99)),
})
export type CodeTells = z.infer<typeof codeTells>

export const spnItem = z.strictObject({
  kind: z.literal('spn'),
  id: z.string(),
  spn: z.int(),
  name: sentence,
  circuit: z.nullable(slug),
  tells: z.nullable(codeTells),
  group: z.string(),
  confidence: z.string(),
  makersDiffer: z.boolean(),
  source,
})

export const pcodeItem = z.strictObject({
  kind: z.literal('pcode'),
  id: z.string(),
  code: z.string(),
  name: sentence,
  circuit: z.nullable(slug),
  failure: z.string(),
  tells: z.nullable(codeTells),
  group: z.string(),
  makersDiffer: z.boolean(),
  source,
})

/** An FMI (or the failure kind of a P-code): what it says, and of 100 faults in each role how many would set it. */
export const failureItem = z.strictObject({
  kind: z.literal('failure'),
  id: z.string(),
  fmi: z.nullable(z.int()),
  name: sentence,
  failure: z.string(),
  firstThought: z.nullable(sentence),
  /** null: the kind argues for nothing in particular, so it moves no suspect within its circuit. */
  byRole: z.nullable(z.partialRecord(circuitRole, z.number())),
  otherwise: z.number(),
  supports: z.nullable(sentence),
  arguesAgainst: z.nullable(sentence),
  /** What a code of this kind leaves open, whatever circuit it names. */
  doesNotProve: sentence,
  source,
})

export const setupItem = z.strictObject({
  kind: z.literal('setup'),
  id: slug,
  name: z.string(),
  minutes: z.number(),
  requires: z.array(slug),
  closedByTest: z.boolean(),
  source,
})

/** A part or a tool by the name the trade uses. */
export const wordItem = z.strictObject({
  kind: z.enum(['part', 'tool', 'system', 'circuit']),
  id: slug,
  name: z.string(),
  source,
})
