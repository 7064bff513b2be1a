import * as z from 'zod/mini'
import { id, slug } from './id'
import { place } from './place'
import { alsoEntered } from './setting'
import { instant, zone } from './time'

/** Job states after rule R13. `waiting` says for what; reopened is `open` with the closing kept in the log. */
export const JOB_STATES = [
  'called',
  'open',
  'assigned',
  'underWay',
  'waitingParts',
  'waitingApproval',
  'waitingRetrieval',
  'closed',
] as const
export const jobState = z.enum(JOB_STATES)
export type JobState = z.infer<typeof jobState>

/** Where the people are (rule R2), apart from the machine. */
export const PEOPLE_STATES = ['withMachine', 'onTheWay', 'beingFetched', 'safe'] as const
export const peopleState = z.enum(PEOPLE_STATES)
export type PeopleState = z.infer<typeof peopleState>

/** Where the machine is and how (rule R2). */
export const MACHINE_STATES = [
  'stranded',
  'runs',
  'limping',
  'onTow',
  'leftBehind',
  'atShop',
] as const
export const jobMachineState = z.enum(MACHINE_STATES)
export type JobMachineState = z.infer<typeof jobMachineState>

export const WAYS_OUT = ['repairHere', 'limpOut', 'tow', 'returnLater'] as const
export const wayOut = z.enum(WAYS_OUT)
export type WayOut = z.infer<typeof wayOut>

/** What happened just before (F1); a set, in the order shown. */
export const BEFORE = [
  'water',
  'rollover',
  'refuel',
  'jump',
  'longStorage',
  'recentWork',
  'nothing',
] as const

/** A job as opened: what is written once, in the field or at the desk. Later changes are ops of their own. */
export const jobOpening = z.strictObject({
  id,
  machineId: id,
  people: z.strictObject({
    count: z.int().check(z.minimum(1), z.maximum(99)),
    hurt: z.boolean(),
    missing: z.boolean(),
    exposed: z.boolean(),
  }),
  place: z.nullable(place),
  complaint: z.strictObject({
    words: z.string().check(z.minLength(1), z.maxLength(500)),
    symptom: z.nullable(slug),
    lampOn: z.nullable(z.boolean()),
  }),
  before: z.array(z.enum(BEFORE)),
  airTempC: z.nullable(z.number().check(z.minimum(-60), z.maximum(60))),
  weather: z.nullable(z.string().check(z.maxLength(120))),
  openedAt: instant,
  zone,
})
export type JobOpening = z.infer<typeof jobOpening>

/** A job as every screen shows it: the opening, the three states beside each other, and what the server assigns. */
export const job = z.object({
  ...jobOpening.shape,
  /** Server-assigned, e.g. `J-0412`; null while the opening is unsent. */
  number: z.nullable(z.string()),
  state: jobState,
  peopleState,
  machineState: jobMachineState,
  wayOut: z.nullable(wayOut),
  openedBy: id,
  assignedTo: z.array(id),
  /** The job that goes on instead of this one, after a merge (R13). */
  mergedInto: z.optional(id),
  /** Jobs that were merged into this one, and who opened them: theirs it is as well. */
  mergedFrom: z.optional(z.array(id)),
  alsoOpenedBy: z.optional(z.array(id)),
  /** Values that did not stand and that nobody has looked at, the latest first. */
  alsoEntered: z.optional(z.array(alsoEntered)),
})
export type Job = z.infer<typeof job>
