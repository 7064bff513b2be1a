import type { FieldWrite, FirstValues } from '@/db/queries/field-history'
import type { MachineStand } from '@/db/queries/machine-stands'
import type { LineStand, RequestStand } from '@/db/queries/part-lines'
import type { Advice } from '@/lib/model/advice'
import type { Id } from '@/lib/model/id'
import type { JobOpening } from '@/lib/model/job'
import type { LogEntry } from '@/lib/model/log-entry'
import type { Machine } from '@/lib/model/machine'
import type { PartLine, PartRequest } from '@/lib/model/part-request'
import type { Writer } from '@/lib/shop/may-record'
import { FIRST_HLC } from '@/lib/sync/protocol/hlc'
import {
  type Effects,
  type FieldEffect,
  fieldKey,
  type JobStand,
  type JobStep,
  type Known,
  noEffects,
  type Outcome,
  type Standing,
} from './known'
import type { Rejected } from './read-ops'

export const ACCEPTED: Outcome = { kind: 'accepted' }

/** A refusal for good. `field` is the path in the op; `detail` is for the person, e.g. the present state. */
export const reject = (
  code: Rejected['code'],
  field: string | null = null,
  detail: string | null = null,
): Outcome => ({ kind: 'rejected', code, field, detail })

/** Waits for what carries this id. */
export const waitFor = (on: Id): Outcome => ({ kind: 'blocked', on })

const NEW_MACHINE: MachineStand = {
  isFleet: false,
  isDropped: false,
  isPurged: false,
  mergedInto: null,
}

/** The database as it would be after the ops planned so far. */
export class Draft {
  readonly known: Known
  readonly effects: Effects = noEffects()
  readonly #jobs = new Map<Id, JobStand>()
  readonly #opened = new Map<Id, JobOpening>()
  readonly #closed = new Set<Id>()
  readonly #machines = new Map<Id, MachineStand>()
  readonly #entries = new Map<Id, Id>()
  readonly #requests = new Map<Id, RequestStand>()
  readonly #ids = new Set<Id>()

  constructor(known: Known) {
    this.known = known
  }

  job(id: Id): JobStand | undefined {
    return this.#jobs.get(id) ?? this.known.jobs.get(id)
  }

  /** The job that goes on for this one: its own id unless it was merged (M10). */
  leadOf(id: Id): Id {
    return this.job(id)?.mergedInto ?? id
  }

  /** The job that goes on for this one; undefined when there is none. */
  lead(id: Id): JobStand | undefined {
    return this.job(this.leadOf(id))
  }

  machine(id: Id): MachineStand | undefined {
    return this.#machines.get(id) ?? this.known.machines.get(id)
  }

  /** The job an entry is of. */
  jobOfEntry(id: Id): Id | undefined {
    return this.#entries.get(id) ?? this.known.entries.get(id)
  }

  request(id: Id): RequestStand | undefined {
    return this.#requests.get(id) ?? this.known.partRequests.get(id)
  }

  hasLine(id: Id): boolean {
    return this.known.lines.has(id) || this.#ids.has(id)
  }

  /** An entry that ops of this batch may point back to; undefined when it is not known. */
  entry(id: Id): LogEntry | undefined {
    return this.known.deciding.get(id) ?? this.effects.entries.find((entry) => entry.id === id)
  }

  /**
   * Of a job, and of those merged into it, what is known of the deciding entries, with what this batch
   * adds to the logs.
   */
  decidingOf(jobId: Id): LogEntry[] {
    const group = new Set([jobId, ...(this.job(jobId)?.mergedFrom ?? [])])
    const all = [...this.known.deciding.values(), ...this.effects.entries]
    return all.filter((entry) => group.has(entry.jobId))
  }

  /** Who writes, for the question what they may. */
  get writer(): Writer {
    const { actor, guideSafe } = this.known
    return { personId: actor.personId, roles: actor.roles, guideSafe }
  }

  hasAdvice(id: Id): boolean {
    return this.known.advice.has(id) || this.#ids.has(id)
  }

  addMachine(machine: Machine): void {
    this.#machines.set(machine.id, { ...NEW_MACHINE, isFleet: machine.fleet })
    this.effects.machines.push(machine)
  }

  openJob(opening: JobOpening, stand: JobStand): void {
    this.#opened.set(opening.id, opening)
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

  /** Phones that opened jobs on a machine; null for the desk. */
  openersOn(machineId: Id): (Id | null)[] {
    const here = [...this.#opened.values()].filter((job) => job.machineId === machineId)
    return [...(this.known.openersOn.get(machineId) ?? []), ...here.map(() => this.known.deviceId)]
  }

  addEntry(entry: LogEntry): void {
    this.#entries.set(entry.id, entry.jobId)
    this.effects.entries.push(entry)
  }

  addPartRequest(request: PartRequest): void {
    const lines = new Map(
      request.lines.map(({ id, quantity }): [Id, LineStand] => {
        this.#ids.add(id)
        return [id, { state: 'asked', quantity, wanted: null, countedOut: false }]
      }),
    )
    const { id, jobId } = request
    this.#requests.set(id, { id, jobId, isDropped: false, isPurged: false, lines })
    this.effects.partRequests.push(request)
  }

  addLine(request: RequestStand, line: PartLine): void {
    this.#ids.add(line.id)
    this.effects.addedLines.push({ requestId: request.id, line })
    this.#setLine(request, line.id, {
      state: 'asked',
      quantity: line.quantity,
      wanted: null,
      countedOut: false,
    })
  }

  changeLine(request: RequestStand, lineId: Id, stand: LineStand): void {
    this.effects.lineStands.set(lineId, stand)
    this.#setLine(request, lineId, stand)
  }

  #setLine(request: RequestStand, lineId: Id, stand: LineStand): void {
    const now = this.request(request.id) ?? request
    const lines = new Map(now.lines).set(lineId, stand)
    this.#requests.set(request.id, { ...now, lines })
    this.effects.changedRequests.set(request.id, request.jobId)
  }

  /** Takes a request back, or lets it stand again with the mark that it was written into meanwhile. */
  dropRequest(request: RequestStand, drop: { isDropped: boolean; revived: boolean }): void {
    const now = this.request(request.id) ?? request
    this.#requests.set(request.id, { ...now, isDropped: drop.isDropped })
    this.effects.changedRequests.set(request.id, request.jobId)
    this.effects.drops.set(request.id, { entity: 'partRequest', ...drop })
  }

  /** As dropRequest, of a machine. */
  dropMachine(id: Id, drop: { isDropped: boolean; revived: boolean }): void {
    this.#machines.set(id, { ...(this.machine(id) ?? NEW_MACHINE), isDropped: drop.isDropped })
    this.effects.drops.set(id, { entity: 'machine', ...drop })
  }

  addAdvice(advice: Advice): void {
    this.#ids.add(advice.id)
    this.effects.advice.push(advice)
  }

  /** Every write of a field, the first among them, as they stand by now. */
  writesOf(entityId: Id, field: string): FieldWrite[] {
    const key = fieldKey(entityId, field)
    const changed = this.effects.fields.get(key)?.writes ?? new Map<Id, FieldWrite>()
    const known = this.known.writes.get(key) ?? []
    const held = new Map([...known, ...changed.values()].map((write) => [write.id, write]))
    if (held.size === 0) {
      const first = this.#firstOf(entityId, field)
      return first === undefined ? [] : [first]
    }
    return [...held.values()]
  }

  /** Ids of every write of a row's values. */
  writeIdsOf(entityId: Id): Set<Id> {
    const writes = this.#fieldsOf(entityId).flatMap((field) => this.writesOf(entityId, field))
    return new Set(writes.map((write) => write.id))
  }

  /** What was written into a row after it was made. */
  editsOf(entityId: Id): FieldWrite[] {
    const fields = this.#fieldsOf(entityId).filter((field) => field !== 'row')
    const writes = fields.flatMap((field) => this.writesOf(entityId, field))
    return writes.filter((write) => write.id !== entityId)
  }

  #fieldsOf(entityId: Id): string[] {
    const keys = [...this.known.writes.keys(), ...this.effects.fields.keys()]
    const start = fieldKey(entityId, '')
    const own = keys.filter((key) => key.startsWith(start)).map((key) => key.slice(start.length))
    return [...new Set(own)]
  }

  /** Keeps writes of a field whose state changed, or that are new. */
  keepWrites(at: Pick<FieldEffect, 'entity' | 'entityId' | 'field'>, writes: FieldWrite[]): void {
    const key = fieldKey(at.entityId, at.field)
    const effect = this.effects.fields.get(key) ?? { ...at, writes: new Map() }
    for (const write of writes) effect.writes.set(write.id, write)
    this.effects.fields.set(key, effect)
  }

  /** A value that stands now. */
  letStand(standing: Standing): void {
    this.effects.standing.set(fieldKey(standing.entityId, standing.setting.field), standing)
  }

  /** What a row was first written with, as the first write of the field. */
  #firstOf(entityId: Id, field: string): FieldWrite | undefined {
    const first = this.known.firsts.get(entityId) ?? this.#openedHere(entityId)
    if (first === undefined || !(field in first.values)) return undefined
    return {
      id: entityId,
      value: first.values[field],
      claimedHlc: null,
      orderedHlc: FIRST_HLC,
      clockOdd: false,
      deviceId: first.deviceId,
      dseq: null,
      personId: first.personId,
      writtenAt: first.at,
      receivedAt: first.at,
      afterSeq: -1,
      state: 'current',
      lostAfter: null,
      isLookedAt: false,
    }
  }

  #openedHere(jobId: Id): FirstValues | undefined {
    const opening = this.#opened.get(jobId)
    if (opening === undefined) return undefined
    const { complaint, place, airTempC, weather, openedAt } = opening
    return {
      id: jobId,
      values: { complaintWords: complaint.words, place, airTempC, weather },
      deviceId: this.known.deviceId,
      personId: this.known.actor.personId,
      at: openedAt,
    }
  }
}
