import type { Id } from '@/lib/model/id'
import { assertNever } from '@/lib/model/result'
import type { Op } from '@/lib/sync/protocol/op'
import type { ReadOp } from './read-ops'

const KINDS = [
  'jobs',
  'machines',
  'models',
  'entries',
  'partRequests',
  'newLines',
  'advice',
  'setJobs',
  'setMachines',
  'setRequests',
  'droppedMachines',
  'withdrawals',
] as const

/** Ids of each kind that a batch speaks of; `set`: rows whose values it sets or takes back. */
export type Named = Record<(typeof KINDS)[number], Set<Id>>

/** Everything the ops of a batch name. */
export function namesOf(ops: readonly ReadOp[]): Named {
  const named = Object.fromEntries(KINDS.map((kind) => [kind, new Set<Id>()])) as Named
  for (const { read } of ops) if (read.kind === 'op') addNames(named, read.op)
  return named
}

function addNames(named: Named, op: Op): void {
  switch (op.kind) {
    case 'machine.add':
      named.machines.add(op.fields.id)
      if (op.fields.modelId !== null) named.models.add(op.fields.modelId)
      return
    case 'job.open':
      named.jobs.add(op.fields.id)
      named.machines.add(op.fields.machineId)
      return
    case 'job.move':
    case 'job.people':
    case 'job.machine':
      named.jobs.add(op.entityId)
      return
    case 'job.set':
    case 'job.settle':
      named.jobs.add(op.entityId)
      named.setJobs.add(op.entityId)
      return
    case 'machine.set':
    case 'machine.settle':
    case 'machine.drop':
      addMachine(named, op)
      return
    case 'log.add':
      named.jobs.add(op.fields.jobId)
      named.entries.add(op.fields.id)
      if (op.fields.supersedes !== null) named.entries.add(op.fields.supersedes)
      return
    case 'partRequest.ask':
    case 'partLine.add':
    case 'partLine.cancel':
    case 'partLine.quantity':
    case 'partRequest.drop':
      addRequest(named, op)
      return
    case 'book.heard':
      named.withdrawals.add(op.entityId)
      return
    case 'advice.keep':
      named.jobs.add(op.fields.jobId)
      named.advice.add(op.fields.id)
      return
    default:
      assertNever(op)
  }
}

function addMachine(named: Named, op: Op): void {
  named.machines.add(op.entityId)
  named.setMachines.add(op.entityId)
  if (op.kind === 'machine.drop') named.droppedMachines.add(op.entityId)
}

function addRequest(named: Named, op: Op): void {
  named.partRequests.add(op.entityId)
  if (op.jobId !== null) named.jobs.add(op.jobId)
  if (op.kind === 'partRequest.ask') {
    named.jobs.add(op.fields.jobId)
    named.partRequests.add(op.fields.id)
    for (const line of op.fields.lines) addLine(named, line)
    return
  }
  named.setRequests.add(op.entityId)
  if (op.kind === 'partLine.add') addLine(named, op.fields.line)
}

function addLine(named: Named, line: { id: Id; condemnedBy: Id | null }): void {
  named.newLines.add(line.id)
  if (line.condemnedBy !== null) named.entries.add(line.condemnedBy)
}
