import type { Advice } from '@/lib/model/advice'
import type { Id } from '@/lib/model/id'
import type { JobMachineState, JobOpening, JobState, PeopleState, WayOut } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartRequest } from '@/lib/model/part-request'
import type { Actor } from '@/lib/model/person'
import type { Place } from '@/lib/model/place'
import type { Writer } from '@/lib/shop/may-record'
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
}

/**
 * What became of an op; kept with it, so that a lost answer can be given again (P6). Only `blocked` is
 * not final: it is judged anew whenever the op is sent again.
 */
export type Outcome =
  | { kind: 'accepted' }
  | { kind: 'rejected'; code: Rejected['code']; field: string | null; detail: string | null }
  | { kind: 'blocked'; on: string }

/** Everything of the database that a batch can depend on, loaded before it is planned. */
export type Known = {
  actor: Actor
  deviceId: Id
  /** Ops of this batch that came before: their text as it was sent, and what became of them. */
  seen: ReadonlyMap<string, { raw: string; outcome: Outcome }>
  jobs: ReadonlyMap<Id, JobStand>
  /** Closed jobs that this device closed itself. */
  closedHere: ReadonlySet<Id>
  machines: ReadonlySet<Id>
  models: ReadonlySet<Id>
  /** Entries by id with the job they are of. */
  entries: ReadonlyMap<Id, Id>
  /** Entries that decide on others: those this batch points back to, and of its jobs every way out, photo and strike. */
  deciding: ReadonlyMap<Id, LogEntry>
  partRequests: ReadonlySet<Id>
  advice: ReadonlySet<Id>
  /** Checks and swaps that the published code books mark safe for guides. */
  guideSafe: ReadonlySet<string>
}

/** One step of one of a job's states, for the audit trail. */
export type JobStep = { jobId: Id; what: 'job' | 'people' | 'machine'; from: string; to: string }

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
}

export const ACCEPTED: Outcome = { kind: 'accepted' }

/** A refusal for good. `field` is the path in the op; `detail` is for the person, e.g. the present state. */
export const reject = (
  code: Rejected['code'],
  field: string | null = null,
  detail: string | null = null,
): Outcome => ({ kind: 'rejected', code, field, detail })

/** Waits for what carries this id. */
export const waitFor = (on: Id): Outcome => ({ kind: 'blocked', on })

/** The database as it would be after the ops planned so far. */
export class Draft {
  readonly known: Known
  readonly effects: Effects = {
    machines: [],
    jobs: [],
    changedJobs: new Map(),
    steps: [],
    entries: [],
    partRequests: [],
    advice: [],
  }
  readonly #jobs = new Map<Id, JobStand>()
  readonly #opened = new Set<Id>()
  readonly #closed = new Set<Id>()
  readonly #entries = new Map<Id, Id>()
  readonly #ids = new Set<Id>()

  constructor(known: Known) {
    this.known = known
  }

  job(id: Id): JobStand | undefined {
    return this.#jobs.get(id) ?? this.known.jobs.get(id)
  }

  hasMachine(id: Id): boolean {
    return this.known.machines.has(id) || this.#ids.has(id)
  }

  /** The job an entry is of. */
  jobOfEntry(id: Id): Id | undefined {
    return this.#entries.get(id) ?? this.known.entries.get(id)
  }

  /** An entry that ops of this batch may point back to; undefined when it is not known. */
  entry(id: Id): LogEntry | undefined {
    return this.known.deciding.get(id) ?? this.effects.entries.find((entry) => entry.id === id)
  }

  /** Of a job what is known of its deciding entries, with what this batch adds to its log. */
  decidingOf(jobId: Id): LogEntry[] {
    return [...this.known.deciding.values(), ...this.effects.entries].filter(
      (entry) => entry.jobId === jobId,
    )
  }

  /** Who writes, for the question what they may. */
  get writer(): Writer {
    const { actor, guideSafe } = this.known
    return { personId: actor.personId, roles: actor.roles, guideSafe }
  }

  hasPartRequest(id: Id): boolean {
    return this.known.partRequests.has(id) || this.#ids.has(id)
  }

  hasAdvice(id: Id): boolean {
    return this.known.advice.has(id) || this.#ids.has(id)
  }

  addMachine(machine: Machine): void {
    this.#ids.add(machine.id)
    this.effects.machines.push(machine)
  }

  openJob(opening: JobOpening, stand: JobStand): void {
    this.#opened.add(opening.id)
    this.#jobs.set(opening.id, stand)
    this.effects.jobs.push({ opening, stand })
  }

  /** A job opened in this batch is written once, as it ends; an older one is updated once. */
  changeJob(id: Id, stand: JobStand): void {
    if (stand.state === 'closed' && this.job(id)?.state !== 'closed') this.#closed.add(id)
    this.#jobs.set(id, stand)
    if (!this.#opened.has(id)) {
      this.effects.changedJobs.set(id, stand)
      return
    }
    const opened = this.effects.jobs.find((job) => job.opening.id === id)
    if (opened) opened.stand = stand
  }

  /** True when this device closed the job itself: what it still writes then does not reopen it. */
  isClosedHere(id: Id): boolean {
    return this.#closed.has(id) || this.known.closedHere.has(id)
  }

  /** As changeJob, along one of its states and kept in the audit trail. */
  stepJob(step: JobStep, stand: JobStand): void {
    this.effects.steps.push(step)
    this.changeJob(step.jobId, stand)
  }

  addEntry(entry: LogEntry): void {
    this.#entries.set(entry.id, entry.jobId)
    this.effects.entries.push(entry)
  }

  addPartRequest(request: PartRequest): void {
    this.#ids.add(request.id)
    this.effects.partRequests.push(request)
  }

  addAdvice(advice: Advice): void {
    this.#ids.add(advice.id)
    this.effects.advice.push(advice)
  }
}
