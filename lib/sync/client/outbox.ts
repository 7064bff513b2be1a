import type { OutboxRecord, OutboxState, PhoneDb } from './phone-db'

/**
 * The outbox by state. Each state is read whole: a look for several at once walks the index record by
 * record, which with a day's work costs more than everything else in a run. One transaction, so that no
 * record is missed or seen twice while another tab moves it.
 */

/** States of what may lie on top of the shop's rows: all but `done`. */
export const ON_TOP: readonly OutboxState[] = ['waiting', 'blocked', 'stuck', 'taken']

/** The records in one of these states, in the order of their numbers. */
export const recordsIn = (db: PhoneDb, ...states: OutboxState[]): Promise<OutboxRecord[]> =>
  db.transaction('r', db.outbox, async () => {
    const found = await Promise.all(states.map((state) => inState(db, state).toArray()))
    return found.flat().sort((a, b) => a.dseq - b.dseq)
  })

/** The numbers of the records in one of these states, in no order. */
export const numbersIn = (db: PhoneDb, ...states: OutboxState[]): Promise<number[]> =>
  db.transaction('r', db.outbox, async () =>
    (await Promise.all(states.map((state) => inState(db, state).primaryKeys()))).flat(),
  )

/** How many records are in one of these states. */
export const countIn = (db: PhoneDb, ...states: OutboxState[]): Promise<number> =>
  db.transaction('r', db.outbox, async () => {
    const counts = await Promise.all(states.map((state) => inState(db, state).count()))
    return counts.reduce((sum, count) => sum + count, 0)
  })

const inState = (db: PhoneDb, state: OutboxState) => db.outbox.where('state').equals(state)
