import type { Job, JobMachineState, JobState, PeopleState, WayOut } from '@/lib/model/job'
import { mayMove } from './job-states'

/** What a way out does to the states of a job (rules R2, R10, R13), decided without a clock. */
export type StatesAfter = { machine: JobMachineState; people: PeopleState }

const MACHINE_AFTER: Record<WayOut, JobMachineState> = {
  repairHere: 'runs',
  limpOut: 'limping',
  tow: 'onTow',
  returnLater: 'leftBehind',
}

/**
 * Where machine and people are after a way out, when nothing else is said: the people on their way with any
 * of them, unless they are safe already (R2). A state that may not be reached from the present one stays as
 * it is.
 */
export function statesAfter(
  way: WayOut,
  now: Pick<Job, 'machineState' | 'peopleState'>,
): StatesAfter {
  const machine = MACHINE_AFTER[way]
  const people = now.peopleState === 'safe' ? 'safe' : 'onTheWay'
  return {
    machine: mayMove('machine', now.machineState, machine) ? machine : now.machineState,
    people: mayMove('people', now.peopleState, people) ? people : now.peopleState,
  }
}

/**
 * The job's own state once the machine's is decided: left behind it waits to be fetched, otherwise a job not
 * yet begun, or one that waited for a machine no longer left behind, is under way now. A closed job, and one
 * that waits for something else, stays as it is.
 */
export function jobStateAfter(state: JobState, machine: JobMachineState): JobState {
  if (state === 'closed') return state
  if (machine === 'leftBehind') return 'waitingRetrieval'
  return BEGUN_BY_IT.includes(state) ? 'underWay' : state
}

const BEGUN_BY_IT: readonly JobState[] = ['called', 'open', 'assigned', 'waitingRetrieval']

/** What is told of a machine that is left behind: key, tap and leaks, how secured, whose land, fetch by (R2). */
export const LEFT_BEHIND_LINES = ['key', 'tap', 'secured', 'land', 'fetch'] as const
export type LeftBehindLine = (typeof LEFT_BEHIND_LINES)[number]

/**
 * What is still missing before a machine may be left behind, the first of: a position on the job, a photo in
 * the log, every line told (rule R2). Null when all is there. Blank lines count as not told.
 */
export function leftBehindLacks(told: {
  hasPlace: boolean
  hasPhoto: boolean
  lines: Readonly<Record<LeftBehindLine, string>>
}): 'place' | 'photo' | 'lines' | null {
  if (!told.hasPlace) return 'place'
  if (!told.hasPhoto) return 'photo'
  return LEFT_BEHIND_LINES.some((line) => told.lines[line].trim() === '') ? 'lines' : null
}
