import type { Actor } from '@/lib/model/person'
import type { SendState } from '@/lib/sync/client/phone-sender'
import type { NewPhoto } from '@/lib/sync/client/views'
import type { OpInput } from '@/lib/sync/protocol/op'

/** A photo on its way into the page: its bytes as text. */
export type PhotoText = Omit<NewPhoto, 'bytes' | 'thumb'> & { base64: string }

/** What lies in the phone's store, read cold. */
export type Kept = {
  outbox: { dseq: number; opId: string; state: string }[]
  rows: { key: string; seq: number | null; jobId: string | null }[]
  photos: { hash: string; state: string }[]
  photoBytes: string[]
  drafts: Record<string, unknown>
  /** The last op number given out. */
  stamped: number
  /** The change number up to which it has pulled. */
  cursor: number
}

/** How much a run left unsent, and what it met. */
export type Left = { ops: number; photos: number } & Pick<SendState, 'reached' | 'need'>

/** What the test asks of the page. */
export type KillPage = {
  /** Opens the store of this person; answers the phone's id. */
  open(actor: Actor): Promise<string>
  /** Counts steps anew and stands still at that one; 0: at none. */
  arm(at: number): void
  /** Names of the steps since then. */
  steps(): string[]
  /** Writes a draft and waits until the store has it. */
  draft(key: string, value: unknown): Promise<void>
  record(ops: OpInput[], more: { photo: PhotoText | null; clearDrafts: string[] }): Promise<void>
  /** One whole run of the sender. */
  send(): Promise<Left>
  look(draftKeys: readonly string[]): Promise<Kept>
}

declare global {
  var killPage: KillPage | undefined
}
