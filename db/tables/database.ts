import type {
  CodeBookContentTable,
  CodeBookDraftItemTable,
  CodeBookDraftTable,
  CodeBookHeardTable,
  CodeBookItemTable,
  CodeBookVersionTable,
  CodeBookWithdrawalTable,
} from './code-book'
import type {
  ConsentTable,
  ContactPlanTable,
  JobAssignmentTable,
  JobTable,
  PartLineTable,
  PartRequestTable,
  PhotoTable,
} from './job'
import type { AuditEntryTable, LogEntryTable } from './log-entry'
import type {
  BagTable,
  BookingTable,
  MachineModelTable,
  MachineTable,
  MeterProfileTable,
} from './machine'
import type { FieldHistoryTable, MergingTable } from './merge'
import type {
  CredentialTable,
  DeviceTable,
  MembershipTable,
  PartyContactTable,
  PartyTable,
  PersonContactTable,
  PersonTable,
  SessionTable,
} from './person'
import type { QuarantineDecisionTable, QuarantineOpTable } from './quarantine'
import type { ChangeLogTable, ShopCounterTable, ShopTable } from './shop'
import type { AdviceTable, SyncOpTable } from './sync-op'

/**
 * Every table of schema public. Names are the camel case of the SQL names (the client's plugin
 * converts them); instants are ISO strings in UTC with milliseconds, bigint is number.
 */
export type Database = {
  shop: ShopTable
  shopCounter: ShopCounterTable
  changeLog: ChangeLogTable
  person: PersonTable
  personContact: PersonContactTable
  membership: MembershipTable
  credential: CredentialTable
  session: SessionTable
  device: DeviceTable
  party: PartyTable
  partyContact: PartyContactTable
  machineModel: MachineModelTable
  machine: MachineTable
  meterProfile: MeterProfileTable
  bag: BagTable
  booking: BookingTable
  codeBookVersion: CodeBookVersionTable
  codeBookItem: CodeBookItemTable
  codeBookContent: CodeBookContentTable
  codeBookDraft: CodeBookDraftTable
  codeBookDraftItem: CodeBookDraftItemTable
  codeBookWithdrawal: CodeBookWithdrawalTable
  codeBookHeard: CodeBookHeardTable
  job: JobTable
  jobAssignment: JobAssignmentTable
  partRequest: PartRequestTable
  partLine: PartLineTable
  photo: PhotoTable
  contactPlan: ContactPlanTable
  consent: ConsentTable
  logEntry: LogEntryTable
  auditEntry: AuditEntryTable
  syncOp: SyncOpTable
  quarantineOp: QuarantineOpTable
  quarantineDecision: QuarantineDecisionTable
  fieldHistory: FieldHistoryTable
  merging: MergingTable
  advice: AdviceTable
}
