import * as z from 'zod/mini'
import { codeContext, codeSeen } from './code-seen'
import { id, slug } from './id'
import { jobMachineState, peopleState, wayOut } from './job'
import { specValue } from './machine-model'
import { meterFunction, quantity } from './meter-profile'
import { photoRef, voiceRef } from './photo'
import { instant, zone } from './time'

const words = z.string().check(z.minLength(1), z.maxLength(2000))
const finite = z.number()

/** The figures shown with a reading when it was saved, so that they can be shown again (rule R23). */
export const readingVerdict = z.strictObject({
  verdict: z.enum(['in', 'outLow', 'outHigh', 'tooClose']),
  estimate: finite,
  standardU: finite,
  expandedU: finite,
  conformance: z.nullable(finite),
  conformanceExact: z.nullable(finite),
})

/** What a numeric reading keeps: the value as typed and in the kept unit, and everything its budget needs. */
export const readingBody = z.strictObject({
  kind: z.literal('reading'),
  checkId: slug,
  quantity,
  value: finite,
  unit: z.string(),
  asTyped: z.string().check(z.maxLength(20)),
  /** Over range on the display ("OL"): `value` is then the top of the range. */
  overRange: z.boolean(),
  /** Measured on the suspect part, or on a known-good one of the same kind (the good twin, rule R17). */
  subject: z.enum(['suspect', 'knownGood']),
  meterId: id,
  meterName: z.string(),
  meterFunction,
  leadsOhm: z.strictObject({ low: finite, high: finite }),
  nulled: z.boolean(),
  partTempC: z.nullable(finite),
  meterTempC: z.nullable(finite),
  perKelvin: finite,
  spec: z.nullable(specValue),
  result: z.nullable(readingVerdict),
})
export type ReadingBody = z.infer<typeof readingBody>

export const SWAP_STEPS = ['spareFitted', 'oldRefitted', 'newFitted'] as const

export const logBody = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('symptom'),
    symptom: slug,
    conditions: z.array(slug),
    words: z.nullable(words),
  }),
  z.strictObject({ kind: z.literal('code'), seen: codeSeen, context: codeContext }),
  /** Codes that could not be read, with the reason (rule R11). */
  z.strictObject({ kind: z.literal('codesUnreadable'), reason: words }),
  z.strictObject({
    kind: z.literal('codesCleared'),
    readAgain: z.enum(['noneBack', 'back', 'notYet']),
  }),
  z.strictObject({
    kind: z.literal('check'),
    checkId: slug,
    outcome: slug,
    asWritten: z.boolean(),
    differed: z.nullable(words),
  }),
  z.strictObject({ kind: z.literal('couldNot'), checkId: slug, reason: words }),
  readingBody,
  /** One step of a swap; the order of the steps is the order of the entries. `faultPresent` null: not tried. */
  z.strictObject({
    kind: z.literal('swap'),
    swapId: slug,
    step: z.enum(SWAP_STEPS),
    faultPresent: z.nullable(z.boolean()),
    partFrom: z.enum(['bag', 'twin', 'shop']),
    partWords: z.nullable(words),
  }),
  z.strictObject({
    kind: z.literal('fix'),
    fault: slug,
    words,
    temporary: z.nullable(z.strictObject({ limit: words, undo: words })),
  }),
  z.strictObject({
    kind: z.literal('proofRun'),
    starts: z.int().check(z.minimum(0)),
    minutes: z.number().check(z.minimum(0)),
    faults: z.int().check(z.minimum(0)),
    hot: z.boolean(),
    words: z.nullable(words),
    /** One-sided 95 % bounds shown when it was saved, as shares of starts (0 to 1); null with no starts. */
    boundExact: z.nullable(finite),
    boundRuleOfThree: z.nullable(finite),
  }),
  z.strictObject({ kind: z.literal('photo'), photo: photoRef, caption: z.nullable(words) }),
  z.strictObject({ kind: z.literal('voice'), voice: voiceRef, caption: z.nullable(words) }),
  z.strictObject({ kind: z.literal('note'), words }),
  z.strictObject({ kind: z.literal('people'), to: peopleState, words: z.nullable(words) }),
  z.strictObject({
    kind: z.literal('wayOut'),
    wayOut,
    reasons: words,
    machineState: jobMachineState,
    peopleState,
  }),
  /** Takes an earlier entry out of evidence; the earlier one stays and is shown struck. */
  z.strictObject({ kind: z.literal('correction'), reason: words }),
])
export type LogBody = z.infer<typeof logBody>
export type LogKind = LogBody['kind']

/** One dated line of the job log: append-only evidence. `supersedes` points back; nothing is edited. */
export const logEntry = z.strictObject({
  id,
  jobId: id,
  supersedes: z.nullable(id),
  /** When it happened ("about" times are typed) and when it was written; both by the phone's corrected clock. */
  happenedAt: instant,
  writtenAt: instant,
  zone,
  authorId: id,
  deviceId: id,
  engineVersion: z.string(),
  bookVersion: z.nullable(z.int()),
  body: logBody,
})
export type LogEntry = z.infer<typeof logEntry>

/** An entry as it comes back from the shop: with its place in the job's chain. */
export const logRow = z.object({
  ...logEntry.shape,
  receivedAt: z.string(),
  order: z.int(),
  hash: z.string(),
})
export type LogRow = z.infer<typeof logRow>
