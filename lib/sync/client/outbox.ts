import type { Collection } from 'dexie'
import type { OutboxRecord, OutboxState, PhoneDb } from './phone-db'

/**
 * The outbox by state. Each state is read whole: a look for several at once walks the index record by
 * record, which with a day's work costs more than everything else in a run. One transaction, so that no
 * record is missed or seen twice while another tab moves it.
 */

/** States of what may lie on top of the shop's rows: all but `done`. */
export const ON_TOP: readonly OutboxState[] = ['waiting', 'blocked', 'stuck', 'taken']

/** The records in one of these states, in the order of their numbers. */
export const recordsIn = async (db: PhoneDb, ...states: OutboxState[]): Promise<OutboxRecord[]> =>
  (await each(db, states, (one) => one.toArray())).flat().sort((a, b) => a.dseq - b.dseq)

/** The numbers of the records in one of these states, in no order. */
export const numbersIn = async (db: PhoneDb, ...states: OutboxState[]): Promise<number[]> =>
  (await each(db, states, (one) => one.primaryKeys())).flat()

const each = <T>(
  db: PhoneDb,
  states: readonly OutboxState[],
  look: (one: Collection<OutboxRecord, number>) => Promise<T>,
): Promise<T[]> =>
  db.transaction('r', db.outbox, () =>
    Promise.all(states.map((state) => look(db.outbox.where('state').equals(state)))),
  )
