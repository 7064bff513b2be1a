import { type Kysely, sql } from 'kysely'

/**
 * Lines of a part request as a set with counters: `wanted` is the sum of what was asked for and may pass
 * through nothing; a line counted down to nothing is cancelled, and comes back when it is counted up. A
 * row that was taken back and written into meanwhile stands again, marked `revived`.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table part_line
      add column wanted integer,
      add column counted_out boolean not null default false,
      add constraint part_line_counted check (not counted_out or state = 'cancelled');
    alter table part_request add column revived boolean not null default false;
    alter table machine add column revived boolean not null default false;
  `.execute(db)
}
