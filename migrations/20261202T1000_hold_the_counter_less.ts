import { type Kysely, sql } from 'kysely'

/**
 * Evidence is written before the shop's counter is locked, and only its numbers after it: the rows, their
 * indexes and the keys they refer to cost most, and none of that needs the counter. So that nobody who holds
 * the counter waits for a place in a chain that another has written and not yet committed, whoever adds to a
 * job's log takes the job's lock first and the counter after it. Should somebody still stand in the way, the
 * wait for the counter ends before PostgreSQL looks for deadlocks, and everything is taken back.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await createJobLocks(db)
  await createOps(db)
  await replaceEvidence(db)
}

/** lock_jobs(jobs), and lock_counter(shop, jobs): the logs of jobs, in the order of their ids; then the counter. */
async function createJobLocks(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function lock_jobs(p_jobs uuid[]) returns void
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      declare v_job uuid;
      begin
        for v_job in select distinct j from unnest(p_jobs) as j order by j loop
          perform pg_advisory_xact_lock(hashtextextended(v_job::text, 0));
        end loop;
      end
    $$;
    create function lock_counter(p_shop uuid, p_jobs uuid[]) returns bigint
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      begin
        perform public.lock_jobs(p_jobs);
        return public.lock_counter(p_shop);
      end
    $$;
    revoke all on function lock_jobs(uuid[]), lock_counter(uuid, uuid[]) from public;
    grant execute on function lock_jobs(uuid[]), lock_counter(uuid, uuid[]) to farbench_app;
  `.execute(db)
}

/** ops_of(shop, stored): ops as rows, out of what the program says of them. */
async function createOps(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function ops_of(p_shop uuid, p_stored json) returns setof sync_op
      language sql stable set search_path = pg_catalog, public, pg_temp as $$
      select p_shop, o."opId", o."deviceId", o.dseq, o."personId", o.kind, o."entityId", o."jobId", o.raw,
        o.outcome, o.code, o.field, o.detail, o."blockedOn", nullif(o.loser, 'null'::jsonb),
        o."receivedAt", o."settledAt"
      from json_to_recordset(p_stored) as o ("opId" text, "deviceId" uuid, dseq bigint, "personId" uuid,
        kind text, "entityId" text, "jobId" uuid, raw text, outcome text, code text, field text,
        detail text, "blockedOn" text, loser jsonb, "receivedAt" timestamptz, "settledAt" timestamptz)
    $$;
    -- A final outcome never changes (P6).
    create or replace function save_ops(p_shop uuid, p_stored json) returns void
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      begin
        insert into public.sync_op select * from public.ops_of(p_shop, p_stored)
        on conflict (shop_id, op_id) do update set
          outcome = excluded.outcome, code = excluded.code, field = excluded.field,
          detail = excluded.detail, blocked_on = excluded.blocked_on, loser = excluded.loser,
          settled_at = excluded.settled_at
        where sync_op.outcome in ('blocked', 'quarantined');
      end
    $$;
    revoke all on function ops_of(uuid, json) from public;
    grant execute on function ops_of(uuid, json) to farbench_app;
  `.execute(db)
}

/**
 * take_evidence(shop, read_at, jobs, rows, ops, received_at, entries, stored, changes): writes entries that
 * only add to jobs and their ops, locks the counter and takes their change numbers; or nothing (taken =
 * false), when one of these ops or places in a chain was taken meanwhile, or since read_at one of these jobs,
 * something that travels with one, one of these rows, or the code book changed. The counter is locked either
 * way. locked_ms: when it was, ms since 1970.
 */
async function replaceEvidence(db: Kysely<unknown>): Promise<void> {
  await sql`
    create or replace function take_evidence(p_shop uuid, p_read_at bigint, p_jobs uuid[], p_rows text[],
      p_ops text[], p_received_at timestamptz, p_entries json, p_stored json, p_changes jsonb)
      returns table (taken boolean, locked_ms double precision)
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      declare
        v_seq bigint;
        v_locked double precision;
        v_wait text := current_setting('lock_timeout');
        v_jobs uuid[] := array(select distinct e."jobId" from json_to_recordset(p_entries) as e ("jobId" uuid));
      begin
        begin
          perform public.lock_jobs(v_jobs);
          perform set_config('lock_timeout', '700ms', true);
          insert into public.log_entry (shop_id, id, job_id, order_no, supersedes, happened_at, written_at,
            zone, author_id, device_id, engine_version, book_version, kind, body, received_at, canonical,
            prev_hash, hash)
          select p_shop, e.id, e."jobId", e."order", e.supersedes, e."happenedAt", e."writtenAt", e.zone,
            e."authorId", e."deviceId", e."engineVersion", e."bookVersion", e.kind, e.body, p_received_at,
            e.canonical, e."prevHash", e.hash
          from json_to_recordset(p_entries) as e (id uuid, "jobId" uuid, "order" integer, supersedes uuid,
            "happenedAt" timestamptz, "writtenAt" timestamptz, zone text, "authorId" uuid, "deviceId" uuid,
            "engineVersion" text, "bookVersion" integer, kind text, body jsonb, canonical text,
            "prevHash" text, hash text);
          -- Of ops that nobody had seen, one that is there now is a twin; the others were blocked, and go on.
          insert into public.sync_op
            select * from public.ops_of(p_shop, p_stored) o where o.op_id = any(p_ops);
          if json_array_length(p_stored) > cardinality(p_ops) then
            perform public.save_ops(p_shop, (select json_agg(o.value) from json_array_elements(p_stored) o
              where o.value ->> 'opId' <> all(p_ops)));
          end if;
          v_seq := public.lock_counter(p_shop);
          v_locked := extract(epoch from clock_timestamp()) * 1000;
          if v_seq <> p_read_at and public.is_touched(p_shop, p_read_at, p_jobs, p_rows) then
            raise exception 'overtaken' using errcode = 'FB004';
          end if;
          perform 1 from public.take_changes(p_shop, p_changes);
          perform set_config('lock_timeout', v_wait, true);
          return query select true, v_locked;
          return;
        exception
          -- A place in a chain, or an op, was taken meanwhile; or the counter was long in coming.
          when unique_violation or lock_not_available or deadlock_detected or sqlstate 'FB004' then null;
        end;
        perform public.lock_counter(p_shop, v_jobs);
        v_locked := extract(epoch from clock_timestamp()) * 1000;
        return query select false, v_locked;
      end
    $$;
  `.execute(db)
}
