import { type Kysely, sql } from 'kysely'
import { demandChange, oneOf, protect } from './support/protect'

const LOG_KINDS = [
  'symptom',
  'code',
  'codesUnreadable',
  'codesCleared',
  'check',
  'couldNot',
  'reading',
  'swap',
  'fix',
  'proofRun',
  'photo',
  'note',
  'people',
  'wayOut',
  'correction',
]

/**
 * The job log and the audit trail: insert only for the app role, each chained in server order by
 * hash = sha256(previous hash, line feed, canonical text). The canonical text holds ids, never names.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table log_entry (
      shop_id uuid not null,
      id uuid not null,
      job_id uuid not null,
      order_no integer not null check (order_no >= 1),
      supersedes uuid,
      happened_at timestamptz not null,
      written_at timestamptz not null,
      zone text not null check (length(zone) between 1 and 64),
      author_id uuid not null,
      device_id uuid not null,
      engine_version text not null,
      book_version integer,
      kind text not null check (kind in ${oneOf(LOG_KINDS)}),
      body jsonb not null,
      received_at timestamptz not null,
      -- RFC 8785 text of {entry, order, receivedAt, shop}; the columns above repeat it for queries.
      canonical text not null,
      prev_hash text,
      hash text not null,
      primary key (shop_id, id),
      -- One entry for each place, and each place after the first names the one before it: no chain can
      -- fork or leave a place out. The places come first in the key, so that 500 checks are 500 look-ups.
      prev_order integer generated always as (nullif(order_no - 1, 0)) stored,
      unique (shop_id, job_id, order_no),
      unique (shop_id, job_id, order_no, hash),
      check ((order_no = 1) = (prev_hash is null)),
      constraint log_entry_hash check (
        hash = encode(sha256(convert_to(coalesce(prev_hash, '') || chr(10) || canonical, 'UTF8')), 'hex')),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, author_id) references person (shop_id, id),
      foreign key (shop_id, device_id) references device (shop_id, id),
      foreign key (shop_id, supersedes) references log_entry (shop_id, id),
      foreign key (shop_id, job_id, prev_order, prev_hash)
        references log_entry (shop_id, job_id, order_no, hash)
    );
    alter table part_line add foreign key (shop_id, condemned_by) references log_entry (shop_id, id)
      deferrable initially deferred;

    -- chain: the job's id, or the shop's for what belongs to no job.
    create table audit_entry (
      shop_id uuid not null references shop,
      id uuid not null,
      chain uuid not null,
      job_id uuid,
      order_no integer not null check (order_no >= 1),
      at timestamptz not null,
      actor_id uuid,
      device_id uuid,
      action text not null check (length(action) between 1 and 80),
      entity text not null,
      entity_id text not null,
      detail jsonb not null,
      canonical text not null,
      prev_hash text,
      hash text not null,
      primary key (shop_id, id),
      prev_order integer generated always as (nullif(order_no - 1, 0)) stored,
      unique (shop_id, chain, order_no),
      unique (shop_id, chain, order_no, hash),
      check ((order_no = 1) = (prev_hash is null)),
      check (chain = coalesce(job_id, shop_id)),
      constraint audit_entry_hash check (
        hash = encode(sha256(convert_to(coalesce(prev_hash, '') || chr(10) || canonical, 'UTF8')), 'hex')),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, actor_id) references person (shop_id, id),
      foreign key (shop_id, device_id) references device (shop_id, id),
      foreign key (shop_id, chain, prev_order, prev_hash)
        references audit_entry (shop_id, chain, order_no, hash)
    );
  `.execute(db)
  await protect(db, 'log_entry', 'select, insert')
  await protect(db, 'audit_entry', 'select, insert')
  await demandChange(db, { table: 'log_entry', entity: 'logEntry', column: 'id' })
  await createRows(db)
}

/** What take_changes numbers again with a whole job: its entries in order, requests and photos. */
async function createRows(db: Kysely<unknown>): Promise<void> {
  await sql`
    create or replace function rows_of_job(p_shop uuid, p_job uuid)
      returns table (part integer, place bigint, entity text, id text, job_id uuid)
      language sql stable set search_path = pg_catalog, public, pg_temp as $$
      select 1, e.order_no::bigint, 'logEntry', e.id::text, e.job_id
        from public.log_entry e where e.shop_id = p_shop and e.job_id = p_job
      union all
      select 2, 0, 'partRequest', r.id::text, r.job_id
        from public.part_request r where r.shop_id = p_shop and r.job_id = p_job and r.deleted_at is null
      union all
      select 3, 0, 'photo', f.hash, f.job_id
        from public.photo f where f.shop_id = p_shop and f.job_id = p_job
    $$;
  `.execute(db)
}
