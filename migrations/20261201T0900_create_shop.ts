import { type Kysely, sql } from 'kysely'
import { protect } from './support/protect'

/** The shop and the counter that numbers its changes and its jobs. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table shop (
      shop_id uuid primary key,
      name text not null check (length(name) between 1 and 120),
      zone text not null check (length(zone) between 1 and 64),
      currency text not null check (currency ~ '^[A-Z]{3}$'),
      per_minute_minor bigint not null check (per_minute_minor >= 0),
      tow_minor bigint not null check (tow_minor >= 0),
      recovery_minor bigint not null check (recovery_minor >= 0),
      emergency_number text not null,
      phone text not null,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now()
    );
    -- One row per shop. seq: last change number given out. epoch: another one after a restore from a
    -- backup.
    create table shop_counter (
      shop_id uuid primary key references shop,
      epoch text not null default gen_random_uuid()::text,
      seq bigint not null default 0 check (seq >= 0),
      last_job_number integer not null default 0 check (last_job_number >= 0)
    );
  `.execute(db)
  await protect(db, 'shop', 'select, insert, update')
  // The functions of create_change_log move it; nobody else may.
  await protect(db, 'shop_counter', 'select')
}
