import { type Kysely, sql } from 'kysely'

/**
 * enqueue_work: the only way in which the app role puts a task into the queue, in the transaction of
 * its cause. It runs as farbench_work, which owns the queue's schema and sees no table of a shop; the
 * shop is stamped from app.shop_id, so that no payload can speak for another one.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function enqueue_work(
        p_task text, p_payload jsonb, p_key text default null, p_run_at timestamptz default null,
        p_max_attempts integer default null)
      returns void language plpgsql security definer set search_path = pg_catalog, pg_temp as $$
      declare v_shop text := nullif(current_setting('app.shop_id', true), '');
      begin
        if v_shop is null then
          raise exception 'no shop in this transaction' using errcode = 'FB001';
        end if;
        perform graphile_worker.add_job(
          identifier => p_task, payload => (p_payload || jsonb_build_object('shopId', v_shop))::json,
          run_at => p_run_at, max_attempts => p_max_attempts::smallint,
          job_key => case when p_key is null then null else v_shop || ':' || p_key end);
      end
    $$;
    revoke all on function enqueue_work(text, jsonb, text, timestamptz, integer) from public;
    grant execute on function enqueue_work(text, jsonb, text, timestamptz, integer) to farbench_app;
    grant create on schema public to farbench_work;
    alter function enqueue_work(text, jsonb, text, timestamptz, integer) owner to farbench_work;
    revoke create on schema public from farbench_work;
  `.execute(db)
}
