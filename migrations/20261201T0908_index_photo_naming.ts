import { type Kysely, sql } from 'kysely'

/** Finds the entry that names a photo when its bytes come. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create index log_entry_photo on log_entry
      (shop_id, (coalesce(body -> 'photo' ->> 'hash', body -> 'context' ->> 'photo')))
      where kind in ('photo', 'code')
  `.execute(db)
}
