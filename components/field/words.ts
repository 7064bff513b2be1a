import type { BEFORE, Job, JobMachineState, JobState, PeopleState, WayOut } from '@/lib/model/job'
import { type Machine, machineWords } from '@/lib/model/machine'
import type { MachineModel } from '@/lib/model/machine-model'

/** Words of the field's screens, one table per fixed choice. */
export const JOB_STATE_WORDS: Record<JobState, string> = {
  called: 'Called',
  open: 'Open',
  assigned: 'Assigned',
  underWay: 'Under way',
  waitingParts: 'Waiting for parts',
  waitingApproval: 'Waiting for approval',
  waitingRetrieval: 'Waiting to be fetched',
  closed: 'Closed',
}

export const PEOPLE_WORDS: Record<PeopleState, string> = {
  withMachine: 'With the machine',
  onTheWay: 'On the way',
  beingFetched: 'Being fetched',
  safe: 'Safe',
}

export const MACHINE_WORDS: Record<JobMachineState, string> = {
  stranded: 'Stranded',
  runs: 'Runs',
  limping: 'Limping',
  onTow: 'On tow',
  leftBehind: 'Left behind',
  atShop: 'At the shop',
}

export const WAY_OUT_WORDS: Record<WayOut, string> = {
  repairHere: 'Repair here',
  limpOut: 'Limp out',
  tow: 'Tow',
  returnLater: 'Return later',
}

export const BEFORE_WORDS: Record<(typeof BEFORE)[number], string> = {
  water: 'Water',
  rollover: 'Rolled over',
  refuel: 'Refuelled',
  jump: 'Jump started',
  longStorage: 'Stood for long',
  recentWork: 'Recent work',
  nothing: 'Nothing known',
}

/** "Engine lamp on. Just before: water, refuelled." */
export function askedWords({ complaint, before }: Pick<Job, 'complaint' | 'before'>): string {
  const lamp = complaint.lampOn === null ? 'not seen' : complaint.lampOn ? 'on' : 'off'
  const what = before.map((one) => BEFORE_WORDS[one].toLowerCase()).join(', ')
  return `Engine lamp ${lamp}. Just before: ${what === '' ? 'not asked' : what}.`
}

/** Maker and model as typed, with the unit number of the fleet first: "Unit 14, Tarnholt Moor 450". */
export function machineName(
  machine: Machine | null | undefined,
  models: readonly MachineModel[] | undefined,
): string {
  if (!machine) {
    return 'Machine not on this phone'
  }
  const model = models?.find((m) => m.id === machine.modelId)
  return machineWords({ ...machine, ...model })
}

/** "1 code", "2 codes": a count with its noun. */
export const counted = (n: number, one: string, many = `${one}s`): string =>
  `${n} ${n === 1 ? one : many}`

/** The text with a capital at its front, for names of the code book that begin a line. */
export const sentence = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}`
