import type { Generated, JSONColumnType } from 'kysely'
import type { Job, JobMachineState, JobState, PeopleState, WayOut } from '@/lib/model/job'
import type { PartLineState, PartRequest } from '@/lib/model/part-request'
import type { Place } from '@/lib/model/place'

export type JobTable = {
  shopId: string
  id: string
  number: string
  machineId: string
  people: JSONColumnType<Job['people']>
  place: JSONColumnType<Place> | null
  complaint: JSONColumnType<Job['complaint']>
  before: JSONColumnType<Job['before']>
  airTempC: number | null
  weather: string | null
  openedAt: string
  zone: string
  openedBy: string
  openedOn: string | null
  receivedAt: Generated<string>
  state: JobState
  peopleState: PeopleState
  machineState: JobMachineState
  wayOut: WayOut | null
  closedAt: string | null
  /** The phone that closed it; null when the desk did. */
  closedOn: string | null
  /** Set 60 days after closing: from then on no phone holds the job (R22). */
  leftFieldAt: string | null
  deletedAt: string | null
  /** What this job was merged into, and the end of that chain; null while it stands for itself. */
  mergedInto: string | null
  mergedRoot: string | null
}

/** Who works on a job; a set, so rows are added and taken away. */
export type JobAssignmentTable = {
  shopId: string
  jobId: string
  personId: string
  assignedAt: Generated<string>
}

export type PartRequestTable = {
  shopId: string
  id: string
  jobId: string
  askedAt: string
  askedBy: string
  askedOn: string | null
  urgency: PartRequest['urgency']
  note: string | null
  advice: JSONColumnType<NonNullable<PartRequest['advice']>> | null
  receivedAt: Generated<string>
  deletedAt: string | null
  /** It was taken back and written into meanwhile: it stands again. */
  revived: Generated<boolean>
}

export type PartLineTable = {
  shopId: string
  id: string
  requestId: string
  lineNo: number
  part: string
  words: string
  position: string | null
  quantity: number
  choice: PartRequest['lines'][number]['choice']
  number: string | null
  priceMinor: number | null
  priceCurrency: string | null
  condemnedBy: string | null
  state: Generated<PartLineState>
  /** The sum asked for, which may pass through nothing; null: the quantity. */
  wanted: number | null
  countedOut: Generated<boolean>
}

export type PhotoTable = {
  shopId: string
  hash: string
  jobId: string
  bytes: number
  mime: string
  receivedAt: string
  receivedFrom: string | null
}

/** Who is out, when the next contact is due, what to do if the line drops (R1). */
export type ContactPlanTable = {
  shopId: string
  id: string
  jobId: string
  madeAt: string
  madeBy: string
  zone: string
  people: JSONColumnType<unknown[]>
  route: string | null
  nextContactAt: string
  turnBackAt: string | null
  messengerAddress: string | null
  ifLineDrops: string | null
}

/** What a party agreed to or withdrew, in the exact words shown (R9). */
export type ConsentTable = {
  shopId: string
  id: string
  jobId: string
  partyId: string
  kind: 'given' | 'withdrawn'
  words: string
  estimateVersion: number | null
  estimateHash: string | null
  capMinor: number | null
  currency: string | null
  channel: 'signature' | 'callThroughDesk' | 'customerPage'
  witnessId: string | null
  at: string
  zone: string
  receivedAt: string
}
