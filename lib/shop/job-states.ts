import type { JobMachineState, JobState, PeopleState } from '@/lib/model/job'
import type { PartLineState } from '@/lib/model/part-request'
import type { Action } from './permissions'

/**
 * The state machines of a job (rules R2, R13, R14). People and machine stand beside the job's state,
 * never inside it. An illegal move is refused with the present state shown, never decided by a clock.
 */
type Moves<S extends string> = Readonly<Record<S, readonly S[]>>

const WAITING = ['waitingParts', 'waitingApproval', 'waitingRetrieval'] as const

const JOB: Moves<JobState> = {
  called: ['open', 'assigned', 'underWay', 'closed'],
  open: ['assigned', 'underWay', ...WAITING, 'closed'],
  assigned: ['open', 'underWay', ...WAITING, 'closed'],
  underWay: ['open', 'assigned', ...WAITING, 'closed'],
  waitingParts: ['open', 'assigned', 'underWay', 'waitingApproval', 'waitingRetrieval', 'closed'],
  waitingApproval: ['open', 'assigned', 'underWay', 'waitingParts', 'waitingRetrieval', 'closed'],
  waitingRetrieval: ['open', 'assigned', 'underWay', 'waitingParts', 'waitingApproval', 'closed'],
  // Reopened is open, with the closing kept in the log (R13).
  closed: ['open'],
}

const PEOPLE: Moves<PeopleState> = {
  withMachine: ['onTheWay', 'beingFetched', 'safe'],
  onTheWay: ['withMachine', 'beingFetched', 'safe'],
  beingFetched: ['withMachine', 'onTheWay', 'safe'],
  // Safe people go out again before anybody fetches them.
  safe: ['withMachine', 'onTheWay'],
}

const MACHINE: Moves<JobMachineState> = {
  // To the shop only by its own power or on a tow.
  stranded: ['runs', 'limping', 'onTow', 'leftBehind'],
  runs: ['stranded', 'limping', 'onTow', 'leftBehind', 'atShop'],
  limping: ['stranded', 'runs', 'onTow', 'leftBehind', 'atShop'],
  onTow: ['stranded', 'runs', 'limping', 'leftBehind', 'atShop'],
  leftBehind: ['stranded', 'runs', 'limping', 'onTow'],
  atShop: ['runs', 'limping', 'onTow'],
}

const PART_LINE: Moves<PartLineState> = {
  asked: ['identified', 'quoted', 'ordered', 'allocated', 'cancelled'],
  identified: ['quoted', 'ordered', 'allocated', 'cancelled'],
  quoted: ['identified', 'ordered', 'allocated', 'cancelled'],
  ordered: ['promised', 'received', 'cancelled'],
  promised: ['ordered', 'received', 'cancelled'],
  received: ['allocated', 'dispatched', 'fitted', 'returned'],
  allocated: ['received', 'dispatched', 'fitted', 'returned'],
  dispatched: ['received', 'fitted', 'returned'],
  fitted: ['returned'],
  returned: ['credited'],
  credited: [],
  cancelled: [],
}

type States = {
  job: JobState
  people: PeopleState
  machine: JobMachineState
  partLine: PartLineState
}
export type StateKind = keyof States

const ALL: { readonly [K in StateKind]: Moves<States[K]> } = {
  job: JOB,
  people: PEOPLE,
  machine: MACHINE,
  partLine: PART_LINE,
}

/** Every state that `from` may move to, in the order screens list them. */
export function movesFrom<K extends StateKind>(kind: K, from: States[K]): readonly States[K][] {
  const moves: Moves<States[K]> = ALL[kind]
  return moves[from]
}

/** True when `from` may become `to`. A state never moves to itself. */
export function mayMove<K extends StateKind>(kind: K, from: States[K], to: States[K]): boolean {
  return movesFrom(kind, from).includes(to)
}

/** The shortest way from one state to another, the states after `from` in order; null when there is none. */
export function wayBetween<K extends StateKind>(
  kind: K,
  from: States[K],
  to: States[K],
): States[K][] | null {
  const ways: States[K][][] = [[]]
  const seen = new Set<States[K]>([from])
  for (const way of ways) {
    const at = way.at(-1) ?? from
    if (at === to) return way
    for (const next of movesFrom(kind, at)) {
      if (seen.has(next)) continue
      seen.add(next)
      ways.push([...way, next])
    }
  }
  return null
}

/** What a person must be allowed to do to put a job into `to`. */
export function actionToMoveJob(to: JobState): Action {
  if (to === 'closed') return 'job.close'
  if (to === 'assigned') return 'job.assign'
  return 'job.work'
}
