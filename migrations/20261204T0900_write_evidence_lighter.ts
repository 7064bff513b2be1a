import { type Kysely, sql } from 'kysely'

/**
 * Evidence in fewer steps of the same effect: which jobs it adds to is read from its changes, which are a
 * tenth of its text; ops are looked up among those that nobody had seen only where others are with them; and
 * the log of changes no longer asks for each row whether its shop is there, as it is written under the lock
 * of the shop's counter alone, which cannot be without its shop.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table change_log drop constraint if exists change_log_shop_id_fkey`.execute(db)
  await replaceEvidence(db)
}

/** take_evidence as 20261202T1000 has it. */
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
        v_jobs uuid[] := array(
          select distinct (c.value ->> 'jobId')::uuid from jsonb_array_elements(p_changes) c);
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
          if json_array_length(p_stored) = cardinality(p_ops) then
            insert into public.sync_op select * from public.ops_of(p_shop, p_stored);
          else
            insert into public.sync_op
              select * from public.ops_of(p_shop, p_stored) o where o.op_id = any(p_ops);
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
