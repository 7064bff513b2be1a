// The kinds of schema 2: single values, lines as sets with counters, rows taken back.
import { may } from '@/lib/shop/permissions'
import type { OpInput } from '@/lib/sync/protocol/op'
import type { Made, Maker, View } from './op-makers'

export const VALUE_MAKERS: Maker[] = [
  { kind: 'job.set', weight: 4, since: 2, make: setOfJob },
  { kind: 'machine.set', weight: 3, since: 2, make: setOfMachine },
  { kind: 'job.settle', weight: 1, since: 2, make: settleJob },
  { kind: 'partLine.add', weight: 2, since: 2, make: addLine },
  { kind: 'partLine.cancel', weight: 1, since: 2, make: cancelLine },
  { kind: 'partLine.quantity', weight: 4, since: 2, make: countLine },
  { kind: 'partRequest.drop', weight: 1, since: 2, make: dropRequest },
  { kind: 'machine.drop', weight: 1, since: 2, make: dropMachine },
]

const mayAs = (view: View, action: Parameters<typeof may>[1]) =>
  may(view.tab.user.person.roles, action)

type JobSet = Extract<OpInput, { kind: 'job.set' }>
type MachineSet = Extract<OpInput, { kind: 'machine.set' }>

function setOfJob(view: View): Made | undefined {
  const { draw } = view
  const job = draw.pick(view.jobs)
  if (job === undefined || !mayAs(view, 'job.work')) return undefined
  const at = view.now()
  const fields = draw.oneOf<JobSet['fields']>([
    { field: 'complaintWords', value: `Dies after ${draw.below(100)} s` },
    { field: 'airTempC', value: draw.chance(0.2) ? null : draw.between(-30, 20) },
    { field: 'weather', value: draw.oneOf([null, 'Snow', 'Clear']) },
    {
      field: 'place',
      value: {
        latitude: draw.between(50, 60),
        longitude: draw.between(5, 20),
        source: 'typed',
        accuracyMetres: null,
        at,
        asTyped: null,
        words: 'By the hut',
      },
    },
  ])
  return { ops: [{ kind: 'job.set', jobId: job.id, fields }] }
}

function setOfMachine(view: View): Made | undefined {
  const { draw } = view
  const machine = draw.pick(view.machines)
  if (machine === undefined || !mayAs(view, 'machine.add')) return undefined
  const fields = draw.oneOf<MachineSet['fields']>([
    { field: 'hours', value: draw.between(1, 2000) },
    { field: 'unitNumber', value: `U${draw.below(100)}` },
    { field: 'serial', value: draw.chance(0.3) ? null : `S${draw.below(1000)}` },
    { field: 'year', value: draw.between(2001, 2026) },
  ])
  return { ops: [{ kind: 'machine.set', machineId: machine.id, fields }] }
}

/** Somebody has looked at the values that did not stand. */
function settleJob(view: View): Made | undefined {
  const jobs = view.jobs.filter((job) => (job.alsoEntered ?? []).length > 0)
  const job = view.draw.pick(jobs)
  if (job === undefined || !mayAs(view, 'job.work')) return undefined
  const history = (job.alsoEntered ?? []).map((one) => one.id)
  return { ops: [{ kind: 'job.settle', jobId: job.id, fields: { history } }] }
}

function requestOf(view: View) {
  return mayAs(view, 'part.ask') ? view.draw.pick(view.requests) : undefined
}

function addLine(view: View): Made | undefined {
  const request = requestOf(view)
  const like = request?.lines[0]
  if (request === undefined || like === undefined) return undefined
  const { state, ...plain } = like
  const line = { ...plain, id: view.next(), quantity: view.draw.between(1, 4), condemnedBy: null }
  const fields = { requestId: request.id, line }
  return { ops: [{ kind: 'partLine.add', jobId: request.jobId, fields }] }
}

function cancelLine(view: View): Made | undefined {
  const request = requestOf(view)
  const line = request && view.draw.pick(request.lines)
  if (!request || !line) return undefined
  const fields = { requestId: request.id, lineId: line.id }
  return { ops: [{ kind: 'partLine.cancel', jobId: request.jobId, fields }] }
}

function countLine(view: View): Made | undefined {
  const request = requestOf(view)
  const line = request && view.draw.pick(request.lines)
  if (!request || !line) return undefined
  const by = view.draw.oneOf([-2, -1, 1, 1, 2])
  const fields = { requestId: request.id, lineId: line.id, by }
  return { ops: [{ kind: 'partLine.quantity', jobId: request.jobId, fields }] }
}

function dropRequest(view: View): Made | undefined {
  const request = requestOf(view)
  if (request === undefined) return undefined
  const { jobId, id: requestId } = request
  return { ops: [{ kind: 'partRequest.drop', jobId, requestId, fields: {} }] }
}

function dropMachine(view: View): Made | undefined {
  const machine = view.draw.pick(view.machines.filter((one) => !one.fleet))
  if (machine === undefined || !mayAs(view, 'machine.add')) return undefined
  return { ops: [{ kind: 'machine.drop', machineId: machine.id, fields: {} }] }
}
