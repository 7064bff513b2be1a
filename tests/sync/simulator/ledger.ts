// What the phones have written, as the simulator saw it happen: the shop and the stores are held to it.

import type { OutboxRecord } from '@/lib/sync/client/phone-db'
import type { Cursor } from '@/lib/sync/protocol/message'
import type { Op } from '@/lib/sync/protocol/op'
import type { Made } from './op-makers'

export type Recorded = {
  op: Op
  /** Phone and person. */
  store: string
  state: OutboxRecord['state']
  reason: string | null
  /** When it was seen to be taken, ms. */
  takenAt: number | null
  /** Refusing it is right whatever the reason: it was made to be refused. */
  isOdd: boolean
}

/** What is remembered of one person's store on one phone. */
export type StoreFacts = {
  key: string
  cursor: Cursor | null
  gen: number
  /** Photos by hash, with the op of the entry that names each. */
  photos: Map<string, string>
  /** It was handed over and emptied. */
  isEmptied: boolean
  /** Handed over before a restore to an earlier day: nobody has it any more. */
  isForgotten: boolean
}

/** One call of the store's `record`, until it is known what became of it. */
export type Pending = {
  store: string
  made: Made
  isKept: boolean
}

export class Ledger {
  readonly ops = new Map<string, Recorded>()
  readonly stores = new Map<string, StoreFacts>()
  pending: Pending[] = []

  begin(store: string, made: Made): Pending {
    const pending = { store, made, isKept: false }
    this.pending.push(pending)
    return pending
  }

  store(key: string): StoreFacts {
    const known = this.stores.get(key)
    if (known !== undefined) return known
    const made: StoreFacts = {
      key,
      cursor: null,
      gen: 0,
      photos: new Map(),
      isEmptied: false,
      isForgotten: false,
    }
    this.stores.set(key, made)
    return made
  }

  of(store: string): Recorded[] {
    return [...this.ops.values()].filter((recorded) => recorded.store === store)
  }
}
