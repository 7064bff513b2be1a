import { type Kysely, sql } from 'kysely'
import { protect } from './support/protect'

/** What phones sent and what became of it, and the advice, plans and consents of jobs. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    -- raw: the op as it was sent (P2). outcome lasts, so that a lost answer can be given again (P6).
    create table sync_op (
      shop_id uuid not null,
      op_id text not null check (length(op_id) between 1 and 64),
      device_id uuid not null,
      dseq bigint not null,
      person_id uuid not null,
      kind text not null,
      entity_id text,
      job_id uuid,
      raw text not null,
      outcome text not null check (outcome in ('accepted', 'merged', 'rejected', 'blocked', 'quarantined')),
      code text,
      field text,
      detail text,
      blocked_on text,
      loser jsonb,
      received_at timestamptz not null,
      settled_at timestamptz,
      primary key (shop_id, op_id),
      check ((outcome = 'rejected') = (code is not null)),
      foreign key (shop_id, device_id) references device (shop_id, id),
      foreign key (shop_id, person_id) references person (shop_id, id)
    );
    create index sync_op_device on sync_op (shop_id, device_id, dseq);
    create index sync_op_blocked on sync_op (shop_id, blocked_on) where outcome = 'blocked';

    -- A recommendation acted on or overridden, to be recomputed to the same values (R23). The
    -- engine's input and answer are text, as they were: jsonb would reorder them.
    create table advice (
      shop_id uuid not null,
      id uuid not null,
      job_id uuid not null,
      at timestamptz not null,
      engine_version text not null,
      book_version integer not null,
      inputs text not null check (inputs::jsonb is not null),
      shown text not null check (shown::jsonb is not null),
      acted text not null check (acted in ('followed', 'overridden')),
      chose text not null check (length(chose) <= 80),
      reason text check (length(reason) <= 500),
      person_id uuid not null,
      device_id uuid,
      received_at timestamptz not null,
      primary key (shop_id, id),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, person_id) references person (shop_id, id),
      foreign key (shop_id, device_id) references device (shop_id, id)
    );
    create index advice_job on advice (shop_id, job_id, at);

    -- Who is out, when the next contact is due and what to do if the line drops (R1).
    create table contact_plan (
      shop_id uuid not null,
      id uuid not null,
      job_id uuid not null,
      made_at timestamptz not null,
      made_by uuid not null,
      zone text not null check (length(zone) between 1 and 64),
      people jsonb not null,
      route text,
      next_contact_at timestamptz not null,
      turn_back_at timestamptz,
      messenger_address text,
      if_line_drops text,
      primary key (shop_id, id),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, made_by) references person (shop_id, id)
    );
    create index contact_plan_job on contact_plan (shop_id, job_id, made_at);

    -- What a party agreed to, in the exact words shown (R9). Append only; a withdrawal is a row.
    create table consent (
      shop_id uuid not null,
      id uuid not null,
      job_id uuid not null,
      party_id uuid not null,
      kind text not null check (kind in ('given', 'withdrawn')),
      words text not null,
      estimate_version integer,
      estimate_hash text,
      cap_minor bigint check (cap_minor >= 0),
      currency text check (currency ~ '^[A-Z]{3}$'),
      channel text not null check (channel in ('signature', 'callThroughDesk', 'customerPage')),
      witness_id uuid,
      at timestamptz not null,
      zone text not null check (length(zone) between 1 and 64),
      received_at timestamptz not null,
      primary key (shop_id, id),
      check ((cap_minor is null) = (currency is null)),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, party_id) references party,
      foreign key (shop_id, witness_id) references person (shop_id, id)
    );
    create index consent_job on consent (shop_id, job_id, at);
  `.execute(db)
  await protect(db, 'sync_op', 'select, insert, update')
  await protect(db, 'advice', 'select, insert')
  await protect(db, 'contact_plan', 'select, insert')
  await protect(db, 'consent', 'select, insert')
}
