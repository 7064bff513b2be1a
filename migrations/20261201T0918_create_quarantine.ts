import { type Kysely, sql } from 'kysely'
import { protect } from './support/protect'

/**
 * What a revoked phone, or the phone of somebody who left, still sends (R22): kept as sent, apart from
 * every job, until the owner decides on it. Also what the shop knows of each phone: what it told that it
 * still holds, which numbers never came, and what a store that was emptied has lost (P22).
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    -- roles: the person's when the phone was revoked or the membership ended; file_hash: the photo or
    -- voice note that the op names, or that this row is (kind 'file', op_id 'file:' and the hash).
    create table quarantine_op (
      shop_id uuid not null,
      op_id text not null check (length(op_id) between 1 and 80),
      device_id uuid not null,
      person_id uuid not null,
      roles text[] not null,
      dseq bigint not null,
      kind text not null,
      entity_id text,
      job_id uuid,
      file_hash text check (file_hash ~ '^[0-9a-f]{64}$'),
      raw text not null,
      why text not null check (why in ('deviceRevoked', 'membershipEnded')),
      received_at timestamptz not null,
      primary key (shop_id, op_id),
      foreign key (shop_id, device_id) references device (shop_id, id),
      foreign key (shop_id, person_id) references person (shop_id, id)
    );
    create index quarantine_op_device on quarantine_op (shop_id, device_id, dseq);
    create index quarantine_op_file on quarantine_op (shop_id, file_hash) where file_hash is not null;

    -- The owner's word on one of them; there is one for each, and it stands.
    create table quarantine_decision (
      shop_id uuid not null,
      op_id text not null,
      decision text not null check (decision in ('accepted', 'refused')),
      reason text check (length(reason) between 1 and 500),
      decided_by uuid not null,
      decided_at timestamptz not null,
      primary key (shop_id, op_id),
      check ((decision = 'refused') = (reason is not null)),
      foreign key (shop_id, op_id) references quarantine_op (shop_id, op_id),
      foreign key (shop_id, decided_by) references person (shop_id, id)
    );

    alter table device
      add revoked_reason text check (length(revoked_reason) between 1 and 500),
      add revoked_roles text[],
      add held_ops integer,
      add held_photos integer,
      add held_oldest_at timestamptz,
      add held_told_at timestamptz,
      add canary uuid,
      -- Set while numbers are missing; the moment they were last told.
      add gaps_told_at timestamptz,
      -- The phone whose store came after this one's, and what went with the old one.
      add replaced_by uuid,
      add replaced_at timestamptz,
      add lost_ops integer check (lost_ops >= 0),
      add lost_last_on text check (lost_last_on ~ '^[0-9]{4}-[0-9]{2}-[0-9]{2}$'),
      add deleted_ops integer check (deleted_ops >= 0),
      add wipe_told_at timestamptz,
      add foreign key (shop_id, replaced_by) references device (shop_id, id);
    create index device_replaced_by on device (shop_id, replaced_by) where replaced_by is not null;
  `.execute(db)
  await protect(db, 'quarantine_op', 'select, insert')
  await protect(db, 'quarantine_decision', 'select, insert')
}
