import type { FieldWrite, FirstValues, HistoryEntity } from '@/db/queries/field-history'
import type { MachineStand } from '@/db/queries/machine-stands'
import type { LineStand, RequestStand } from '@/db/queries/part-lines'
import type { Advice } from '@/lib/model/advice'
import type { Id } from '@/lib/model/id'
import type { JobMachineState, JobOpening, JobState, PeopleState, WayOut } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartLine, PartRequest } from '@/lib/model/part-request'
import type { Actor } from '@/lib/model/person'
import type { Place } from '@/lib/model/place'
import type { JobSetting, MachineSetting } from '@/lib/model/setting'
import type { Instant } from '@/lib/model/time'
import type { Arrival } from './field-merge'
import type { Rejected } from './read-ops'

/** How a job stands: what an op of a state machine is judged by. */
export type JobStand = {
  state: JobState
  peopleState: PeopleState
  machineState: JobMachineState
  wayOut: WayOut | null
  place: Place | null
  openedBy: Id
  assignedTo: readonly Id[]
  /** The job that goes on instead, after a merge; those merged into this one, and who opened them. */
  mergedInto?: Id | undefined
  mergedFrom?: readonly Id[] | undefined
  alsoOpenedBy?: readonly Id[] | undefined
}

/**
 * What became of an op; kept with it, so that a lost answer can be given again (P6). Only `blocked` is
 * not final: it is judged anew whenever the op is sent again. `merged`: taken, and something lost by it.
 */
export type Outcome =
  | { kind: 'accepted' }
  | { kind: 'merged'; loser: unknown }
  | { kind: 'rejected'; code: Rejected['code']; field: string | null; detail: string | null }
  | { kind: 'blocked'; on: string }

/** Everything of the database that a batch can depend on, loaded before it is planned. */
export type Known = {
  actor: Actor
  deviceId: Id
  /** The shop's clock, and its last change number when this was read. */
  at: Arrival
  /** Ops of this batch that came before: their text as it was sent, and what became of them. */
  seen: ReadonlyMap<string, { raw: string; outcome: Outcome }>
  jobs: ReadonlyMap<Id, JobStand>
  /** Closed jobs that this device closed itself. */
  closedHere: ReadonlySet<Id>
  machines: ReadonlyMap<Id, MachineStand>
  /** Phones that opened jobs on the machines that are to be taken back; null for the desk. */
  openersOn: ReadonlyMap<Id, readonly (Id | null)[]>
  models: ReadonlySet<Id>
  /** Entries by id with the job they are of. */
  entries: ReadonlyMap<Id, Id>
  /** Entries that decide on others: those this batch points back to, and of its jobs every way out, photo and strike. */
  deciding: ReadonlyMap<Id, LogEntry>
  partRequests: ReadonlyMap<Id, RequestStand>
  /** Lines that exist, of those that the batch adds. */
  lines: ReadonlySet<Id>
  advice: ReadonlySet<Id>
  /** Withdrawals from the code book that the batch acknowledges, as far as the shop made them. */
  withdrawals: ReadonlySet<Id>
  /** Writes of the values that the batch sets, by fieldKey; and what the rows were written with. */
  writes: ReadonlyMap<string, readonly FieldWrite[]>
  firsts: ReadonlyMap<Id, FirstValues>
  /** Checks and swaps that the published code books mark safe for guides. */
  guideSafe: ReadonlySet<string>
}

/** One step of one of a job's states, for the audit trail. */
export type JobStep = { jobId: Id; what: 'job' | 'people' | 'machine'; from: string; to: string }

/** A field of a row, as a key. */
export const fieldKey = (entityId: Id, field: string): string => `${entityId} ${field}`

/** Writes of one field whose state changed, by their ids. */
export type FieldEffect = {
  entity: HistoryEntity
  entityId: Id
  field: string
  writes: Map<Id, FieldWrite>
}

/** A value that stands now and is to be written into its row. */
export type Standing =
  | { entity: 'job'; entityId: Id; setting: JobSetting }
  | { entity: 'machine'; entityId: Id; setting: MachineSetting }

/** What a plan asks the write phase to do, each list in the order of the ops. */
export type Effects = {
  machines: Machine[]
  jobs: { opening: JobOpening; stand: JobStand }[]
  /** Existing jobs whose stand changed, with the stand they end in. */
  changedJobs: Map<Id, JobStand>
  /** Steps of job states as they were taken; a job that the field's writing reopened is one of them. */
  steps: JobStep[]
  entries: LogEntry[]
  partRequests: PartRequest[]
  advice: Advice[]
  heard: { withdrawalId: Id; at: Instant }[]
  /** By fieldKey. */
  fields: Map<string, FieldEffect>
  standing: Map<string, Standing>
  looked: { entity: HistoryEntity; entityId: Id; ids: readonly Id[] }[]
  addedLines: { requestId: Id; line: PartLine }[]
  lineStands: Map<Id, LineStand>
  /** Requests whose lines changed, with their job. */
  changedRequests: Map<Id, Id>
  /** Rows taken back or standing again. */
  drops: Map<Id, { entity: 'partRequest' | 'machine'; isDropped: boolean; revived: boolean }>
}

/** Effects that change nothing, to be filled in. */
export const noEffects = (): Effects => ({
  machines: [],
  jobs: [],
  changedJobs: new Map(),
  steps: [],
  entries: [],
  partRequests: [],
  advice: [],
  heard: [],
  fields: new Map(),
  standing: new Map(),
  looked: [],
  addedLines: [],
  lineStands: new Map(),
  changedRequests: new Map(),
  drops: new Map(),
})
