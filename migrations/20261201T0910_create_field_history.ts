import { type Kysely, sql } from 'kysely'
import { protect } from './support/protect'

/** Entities whose single values are merged, with the trigger's word for each. */
const ENTITIES = ['job', 'machine', 'partRequest'] as const

/**
 * Every write of a value that several people may write: the one that stands, the ones it replaced, and
 * the ones that did not stand and wait to be looked at (docs/spec/sync.md, M1 to M5). Rows made by mistake
 * and what was written into them meanwhile are kept here as well (M8).
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    -- id: the op's, or one of its own for the value a row was first written with. value: {"is": ...}.
    -- after_seq: the shop's change number before this write; who had seen a later one had seen the write.
    create table field_history (
      shop_id uuid not null references shop,
      id uuid not null,
      entity text not null check (entity in ('job', 'machine', 'partRequest')),
      entity_id uuid not null,
      field text not null check (length(field) between 1 and 40),
      value jsonb not null,
      -- What the phone stamped, and what it counts as: a stamp of the future is put back for order only.
      claimed_hlc text,
      ordered_hlc text not null,
      clock_odd boolean not null,
      device_id uuid,
      dseq bigint,
      person_id uuid,
      written_at timestamptz not null,
      received_at timestamptz not null,
      after_seq bigint not null,
      state text not null check (state in ('current', 'replaced', 'lost')),
      lost_after bigint,
      looked_at timestamptz,
      looked_by uuid,
      primary key (shop_id, entity_id, field, id),
      check ((looked_at is null) = (looked_by is null)),
      foreign key (shop_id, device_id) references device (shop_id, id),
      foreign key (shop_id, person_id) references person (shop_id, id),
      foreign key (shop_id, looked_by) references person (shop_id, id)
    );
    create unique index field_history_current on field_history (shop_id, entity_id, field)
      where state = 'current';
    create index field_history_open on field_history (shop_id, entity_id)
      where state = 'lost' and looked_at is null;
  `.execute(db)
  await protect(db, 'field_history', 'select, insert, update')
  for (const entity of ENTITIES) {
    await sql`
      create constraint trigger ${sql.ref(`change_number_${entity.toLowerCase()}`)}
        after insert or update on field_history deferrable initially deferred for each row
        when (new.entity = ${sql.lit(entity)})
        execute function demand_change(${sql.lit(entity)}, 'entity_id');
    `.execute(db)
  }
}
