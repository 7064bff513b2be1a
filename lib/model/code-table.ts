import * as z from 'zod/mini'
import { slug } from './id'
import { sentence, source } from './sentence'

/** Shapes of the code book's tables: codes, failure kinds, set-ups and words. */

/** What a fault is to the circuit a code names. */
export const CIRCUIT_ROLES = ['part', 'wiring', 'supply', 'driver', 'sensor', 'mechanism'] as const
export const circuitRole = z.enum(CIRCUIT_ROLES)
export type CircuitRole = z.infer<typeof circuitRole>

export const spnItem = z.strictObject({
  kind: z.literal('spn'),
  id: z.string(),
  spn: z.int(),
  name: sentence,
  circuit: z.nullable(slug),
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
