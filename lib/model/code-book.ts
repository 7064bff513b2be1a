import * as z from 'zod/mini'
import { circuitRole, failureItem, pcodeItem, setupItem, spnItem, wordItem } from './code-table'
import { gate } from './features'
import { slug } from './id'
import { quantity } from './meter-profile'
import { role } from './role'
import { sentence, source } from './sentence'

/**
 * The code book as data (rules R4, R5, R24). Every record says where its figures come from:
 * a published standard by name, `common practice, no source`, or `from memory`.
 */
/** "Of 100 such cases", one number per outcome; each row sums to 100. */
const of100 = z.array(z.number().check(z.minimum(0), z.maximum(100))).check(z.minLength(2))

/** "Of 100", never all and never none: what a person says is no proof. */
const share = z.number().check(z.minimum(1), z.maximum(99))

/** ANSI Z535.6 signal words. */
export const SIGNALS = ['DANGER', 'WARNING', 'CAUTION', 'NOTICE'] as const
export const caution = z.strictObject({ signal: z.enum(SIGNALS), text: sentence })
export type Caution = z.infer<typeof caution>

export const featureItem = z.strictObject({
  kind: z.literal('feature'),
  id: slug,
  name: sentence,
  /** The plain question that finds it out in the field, and each answer's words by value. */
  question: sentence,
  answers: z.record(z.string(), z.string()),
  source,
})

export const symptomItem = z.strictObject({
  kind: z.literal('symptom'),
  id: slug,
  name: sentence,
  gate,
  /** How riders say it; searched as typed. */
  riderWords: z.array(z.string()),
  /** When it does it. `tells`: of 100 such calls with this fault behind them, in how many it would be said so. */
  conditions: z.array(
    z.strictObject({
      id: slug,
      name: z.string(),
      /** The question that it is one answer to: of conditions with the same question only one is said. */
      answers: z.optional(sentence),
      tells: z.nullable(z.strictObject({ of100: z.record(slug, share), otherwise: share })),
    }),
  ),
  /** A complaint that is no fault opens the way out and its rigging at once, without suspects (rule R4). */
  opens: z.enum(['suspects', 'wayOut']),
  /** What the engine can be brought to with this complaint: to run, if badly; to turn; or to neither. */
  engine: z.enum(['runs', 'cranks', 'still']),
  /** Said before anything is touched. */
  cautions: z.array(caution),
  /** Checks by eye, ear and hand that come before any other: a minute or two each, no tools to speak of. */
  firstLook: z.array(slug),
  /** m of rule R5: in how many of 100 such calls two things were wrong. */
  twoWrongOf100: z.number().check(z.minimum(0), z.maximum(50)),
  source,
})
export type SymptomItem = z.infer<typeof symptomItem>

export const faultItem = z.strictObject({
  kind: z.literal('fault'),
  id: slug,
  name: z.string().check(z.minLength(3), z.maxLength(60)),
  system: slug,
  gate,
  /** Share of 100 such calls (this complaint, this kind of machine), something else included (rule R5). */
  shares: z.array(
    z.strictObject({ symptom: slug, gate, of100: z.number().check(z.positive(), z.maximum(100)) }),
  ),
  /** Circuits this fault sits in and what it is there; codes name circuits. */
  circuits: z.array(z.strictObject({ circuit: slug, role: circuitRole })),
  repair: z.nullable(
    z.strictObject({
      words: sentence,
      doesNotFix: z.nullable(sentence),
      minutes: z.number(),
      costMinor: z.int(),
      part: z.nullable(slug),
      setups: z.array(slug),
      /** Chance of 100 that the repair, rightly done, cures this fault. */
      successOf100: z.number().check(z.minimum(1), z.maximum(100)),
      /** The same by hand alone, cleaned, tightened or tied, where the part is not there; missing where it must be. */
      withoutPartOf100: z.optional(z.number().check(z.minimum(1), z.maximum(100))),
    }),
  ),
  onset: z.nullable(sentence),
  wayOut: z.enum(['repairHere', 'limpOut', 'tow', 'returnLater']),
  limpRefused: z.nullable(sentence),
  provedBy: sentence,
  source,
})
export type FaultItem = z.infer<typeof faultItem>

/** A piece of a distribution: `weight` spread evenly over `from`..`to`, as factors of the nominal value. */
const piece = z.strictObject({
  weight: z.number().check(z.positive()),
  from: z.number(),
  to: z.number(),
})
export type Piece = z.infer<typeof piece>

export const MACHINE_STATES = [
  'off',
  'keyOn',
  'cranking',
  'runningNeutral',
  'guardedStand',
] as const

export const checkItem = z.strictObject({
  kind: z.literal('check'),
  id: slug,
  name: z.string().check(z.minLength(3), z.maxLength(60)),
  purpose: sentence,
  gate,
  people: z.union([z.literal(1), z.literal(2)]),
  onePersonWay: z.nullable(sentence),
  roles: z.array(role),
  guideSafe: z.boolean(),
  light: z.enum(['any', 'lampEnough', 'daylight']),
  weather: z.nullable(sentence),
  setups: z.array(slug),
  tools: z.array(z.strictObject({ tool: slug, accuracy: z.nullable(z.string()) })),
  machineState: z.enum(MACHINE_STATES),
  mayMoveMachine: z.boolean(),
  minutes: z.number().check(z.positive()),
  costMinor: z.int(),
  steps: z
    .array(z.strictObject({ text: sentence, caution: z.nullable(caution) }))
    .check(z.minLength(1)),
  cautions: z.array(caution),
  record: sentence,
  /** First outcome is the good one; the others run from mild to plain bad (the noisy-max order). */
  outcomes: z
    .array(z.strictObject({ id: slug, name: z.string(), good: z.boolean() }))
    .check(z.minLength(2)),
  /** Outcome table "of 100" per fault; `otherwise` holds with none of the listed faults present. */
  table: z.record(slug, of100),
  otherwise: of100,
  expected: z.array(z.strictObject({ words: sentence, source })),
  /** For numeric checks: which figure of the spec sheet judges it, and where the true value lies in each state. */
  reading: z.nullable(
    z.strictObject({
      quantity,
      component: slug,
      value: slug,
      /** Used, and labelled common practice, when the spec sheet has no such figure. */
      fallback: z.nullable(
        z.strictObject({
          low: z.nullable(z.number()),
          high: z.nullable(z.number()),
          unit: z.string(),
          source,
        }),
      ),
      good: z.array(piece),
      byFault: z.record(slug, z.array(piece)),
    }),
  ),
  passDoesNotProve: sentence,
  stopWhen: z.nullable(sentence),
  basis: z.enum(['physics', 'commonPractice', 'guess']),
  basisWords: sentence,
  source,
})
export type CheckItem = z.infer<typeof checkItem>

/** A swap with a known-good part, in the order fit, refit, fit (A-B-A). Outcomes: noChange, goneOnce, goneAndBack. */
export const swapItem = z.strictObject({
  kind: z.literal('swap'),
  id: slug,
  name: sentence,
  fault: slug,
  part: slug,
  gate,
  minutes: z.number(),
  setups: z.array(slug),
  guideSafe: z.boolean(),
  cautions: z.array(caution),
  steps: z.array(z.strictObject({ text: sentence, caution: z.nullable(caution) })),
  /** Per fault, of 100: [no change, gone with the good part and not back with the old, gone and back again]. */
  table: z.record(slug, z.tuple([z.number(), z.number(), z.number()])),
  otherwise: z.tuple([z.number(), z.number(), z.number()]),
  basis: z.enum(['physics', 'commonPractice', 'guess']),
  basisWords: sentence,
  source,
})
export type SwapItem = z.infer<typeof swapItem>

export const codeBookItem = z.discriminatedUnion('kind', [
  featureItem,
  symptomItem,
  faultItem,
  checkItem,
  swapItem,
  spnItem,
  pcodeItem,
  failureItem,
  setupItem,
  wordItem,
])
export type CodeBookItem = z.infer<typeof codeBookItem>
export type SpnItem = z.infer<typeof spnItem>
export type PcodeItem = z.infer<typeof pcodeItem>
export type FailureItem = z.infer<typeof failureItem>
export type SetupItem = z.infer<typeof setupItem>
export type WordItem = z.infer<typeof wordItem>
export type FeatureItem = z.infer<typeof featureItem>

/** A whole published version as served and as cached on the phone. `hash` is the SHA-256 of the items' canonical JSON. */
export const codeBook = z.object({
  version: z.int().check(z.minimum(1)),
  hash: z.string(),
  publishedAt: z.string(),
  items: z.array(codeBookItem),
})
export type CodeBook = z.infer<typeof codeBook>
