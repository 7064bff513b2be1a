import type { JobMachineState, JobState, PeopleState, WayOut } from '@/lib/model/job'
import type { PartLineState, PartRequest } from '@/lib/model/part-request'
import type { Role } from '@/lib/model/role'

/** The states and choices in words; the same word on every screen of the desk. */
export const JOB_WORDS: Record<JobState, string> = {
  called: 'Called',
  open: 'Open',
  assigned: 'Assigned',
  underWay: 'Under way',
  waitingParts: 'Waiting for parts',
  waitingApproval: 'Waiting for approval',
  waitingRetrieval: 'Waiting for retrieval',
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

export const LINE_WORDS: Record<PartLineState, string> = {
  asked: 'Asked',
  identified: 'Identified',
  quoted: 'Quoted',
  ordered: 'Ordered',
  promised: 'Promised',
  received: 'Received',
  allocated: 'Allocated',
  dispatched: 'Dispatched',
  fitted: 'Fitted',
  returned: 'Returned',
  credited: 'Credited',
  cancelled: 'Cancelled',
}

export const URGENCY_WORDS: Record<PartRequest['urgency'], string> = {
  now: 'Now',
  today: 'Today',
  thisWeek: 'This week',
}

export const ROLE_WORDS: Record<Role, string> = {
  mechanic: 'mechanic',
  guide: 'guide',
  dispatcher: 'dispatcher',
  parts: 'parts desk',
  owner: 'owner',
}

/** `1 photo`, `3 photos`. */
export const counted = (count: number, one: string, many = `${one}s`) =>
  `${count} ${count === 1 ? one : many}`
