import type { Actor } from '@/lib/model/person'
import type { BenchRecord } from '../records'

/** What an arm is told: the records it keeps unsent, and whose they are. */
export type Task = { records: BenchRecord[]; count: number; actor: Actor; jobId: string }

/** One way to carry records, as the bench's page drives it. Only `push` and `pull` are measured. */
export type Arm = {
  /** Opens a store and keeps the records in it, unsent. */
  fill(task: Task): Promise<void>
  /** Sends them; resolves when the store itself knows that they have arrived. */
  push(): Promise<void>
  /** Opens an empty store. */
  fresh(task: Task): Promise<void>
  /** Fetches everything and keeps it; answers how many records the store then holds. */
  pull(): Promise<number>
}

declare global {
  var benchArms: Record<string, Arm> | undefined
}

/** Makes an arm known to the page. */
export function offer(name: string, arm: Arm): void {
  globalThis.benchArms = { ...globalThis.benchArms, [name]: arm }
}
