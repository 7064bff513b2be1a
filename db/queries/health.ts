import { sql } from 'kysely'
import { withNoShop } from '../client'

/** Asks the database one question; rejects when it does not answer. */
export async function pingDatabase(): Promise<void> {
  await withNoShop(async (tx) => {
    await sql`select 1`.execute(tx)
  })
}
