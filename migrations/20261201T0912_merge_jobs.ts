import { type Kysely, sql } from 'kysely'
import { protect } from './support/protect'

/**
 * One stranding reported twice (R13): a job or machine that was merged stays a row of its own and points
 * to the one that goes on. `merged_into` is what it was merged into, `merged_root` the end of that chain.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  for (const table of ['job', 'machine']) {
    const name = sql.table(table)
    await sql`
      alter table ${name}
        add column merged_into uuid,
        add column merged_root uuid,
        add foreign key (shop_id, merged_into) references ${name} (shop_id, id),
        add foreign key (shop_id, merged_root) references ${name} (shop_id, id),
        add constraint ${sql.ref(`${table}_merged`)} check ((merged_into is null) = (merged_root is null)),
        add constraint ${sql.ref(`${table}_merged_into_other`)} check (merged_into <> id and merged_root <> id);
      create index ${sql.ref(`${table}_merged_root`)} on ${name} (shop_id, merged_root)
        where merged_root is not null;
    `.execute(db)
  }
  await sql`
    -- people: who was put to work on the one that goes on because of the merge; taken off again with it.
    create table merging (
      shop_id uuid not null references shop,
      id uuid not null,
      entity text not null check (entity in ('job', 'machine')),
      entity_id uuid not null,
      into_id uuid not null,
      merged_at timestamptz not null,
      merged_by uuid not null,
      people uuid[] not null,
      undone_at timestamptz,
      undone_by uuid,
      primary key (shop_id, id),
      check ((undone_at is null) = (undone_by is null)),
      foreign key (shop_id, merged_by) references person (shop_id, id),
      foreign key (shop_id, undone_by) references person (shop_id, id)
    );
    create unique index merging_standing on merging (shop_id, entity_id) where undone_at is null;
  `.execute(db)
  await protect(db, 'merging', 'select, insert, update')
  await moveScope(db)
}

/** A merge changes who may hold the rows of both jobs: they are numbered again with the one that goes on. */
async function moveScope(db: Kysely<unknown>): Promise<void> {
  await sql`
    create or replace function rows_of_job(p_shop uuid, p_job uuid)
      returns table (part integer, place bigint, entity text, id text, job_id uuid)
      language sql stable set search_path = pg_catalog, public, pg_temp as $$
      with of_it as (
        select j.id from public.job j where j.shop_id = p_shop and (j.id = p_job or j.merged_root = p_job)
      )
      select 1, 0::bigint, 'job', m.id::text, m.id from of_it m where m.id <> p_job
      union all
      select 2, e.order_no::bigint, 'logEntry', e.id::text, e.job_id
        from public.log_entry e join of_it m on m.id = e.job_id where e.shop_id = p_shop
      union all
      select 3, 0, 'partRequest', r.id::text, r.job_id
        from public.part_request r join of_it m on m.id = r.job_id
        where r.shop_id = p_shop and r.deleted_at is null
      union all
      select 4, 0, 'photo', f.hash, f.job_id
        from public.photo f join of_it m on m.id = f.job_id where f.shop_id = p_shop
    $$;
    create constraint trigger whole_when_merged after update on job deferrable initially deferred
      for each row when (old.merged_root is distinct from new.merged_root)
      execute function demand_whole('id');
  `.execute(db)
}
