import { type Kysely, sql } from 'kysely'
import { demandChange, protect } from './support/protect'

/**
 * Change numbers (sync.md section 1): a dense number per shop, taken by the last statements before
 * commit under the shop_counter row's lock. The app role cannot write the log or the counter but
 * through these functions, which run as the owner and see the shop of app.shop_id alone.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table change_log (
      shop_id uuid not null references shop,
      seq bigint not null,
      entity text not null,
      entity_id text not null,
      job_id uuid,
      state text not null check (state in ('present', 'deleted')),
      -- Whose scope may have changed with it: the whole job was numbered again.
      whole boolean not null default false,
      written_by xid8 not null default pg_current_xact_id(),
      changed_at timestamptz not null default clock_timestamp(),
      primary key (shop_id, seq)
    );
    create index change_log_entity on change_log (shop_id, entity, entity_id, seq);
  `.execute(db)
  await protect(db, 'change_log', 'select')
  await createLock(db)
  await createTake(db)
  await createDemand(db)
  await demandChange(db, { table: 'shop', entity: 'shop', column: 'shop_id' })
}

/** lock_counter(shop), start_counter(shop) and take_job_numbers(shop, how many). */
async function createLock(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function start_counter(p_shop uuid) returns void
      language sql security definer set search_path = pg_catalog, public, pg_temp as $$
      insert into public.shop_counter (shop_id) values (p_shop) on conflict do nothing
    $$;
    -- Makes this transaction the shop's only writer of numbers until it ends; answers the last one.
    create function lock_counter(p_shop uuid) returns bigint
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      declare v_seq bigint;
      begin
        select seq into v_seq from public.shop_counter where shop_id = p_shop for update;
        if not found then
          raise exception 'no counter for shop % in this transaction', p_shop using errcode = 'FB001';
        end if;
        return v_seq;
      end
    $$;
    -- The next job numbers, without gaps: a rollback gives them back.
    create function take_job_numbers(p_shop uuid, p_count integer) returns setof text
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      declare v_last integer;
      begin
        if p_count < 1 then return; end if;
        update public.shop_counter set last_job_number = last_job_number + p_count
          where shop_id = p_shop returning last_job_number into v_last;
        if not found then
          raise exception 'no counter for shop % in this transaction', p_shop using errcode = 'FB001';
        end if;
        return query select 'J-' || lpad(n::text, greatest(4, length(n::text)), '0')
          from generate_series(v_last - p_count + 1, v_last) n;
      end
    $$;
    revoke all on function start_counter(uuid), lock_counter(uuid), take_job_numbers(uuid, integer) from public;
    grant execute on function start_counter(uuid), lock_counter(uuid), take_job_numbers(uuid, integer) to farbench_app;
  `.execute(db)
}

/**
 * take_changes(shop, changes): changes = [{entity, id, jobId?, state?, whole?}] in the order in
 * which they shall travel. Answers the numbers. `whole` on a job numbers all its rows again.
 */
async function createTake(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function take_changes(p_shop uuid, p_changes jsonb)
      returns table (seq bigint, entity text, entity_id text)
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      #variable_conflict use_column
      declare v_seq bigint; v_count bigint;
      begin
        if jsonb_array_length(p_changes) = 0 then return; end if;
        v_seq := public.lock_counter(p_shop);
        return query
          with given as (
            select o.n, 0 as part, 0::bigint as place, c.entity, c.id, c."jobId" as job_id,
              coalesce(c.state, 'present') as state, coalesce(c.whole, false) as whole
            from jsonb_array_elements(p_changes) with ordinality o (value, n)
              cross join lateral jsonb_to_record(o.value)
                as c (entity text, id text, "jobId" uuid, state text, whole boolean)
          ), wanted as (
            select * from given
            union all
            select g.n, r.part, r.place, r.entity, r.id, r.job_id, g.state, false
            from given g cross join lateral public.rows_of_job(p_shop, g.job_id) r
            where g.whole and g.entity = 'job'
          ), written as (
            insert into public.change_log (shop_id, seq, entity, entity_id, job_id, state, whole)
            select p_shop, v_seq + row_number() over (order by n, part, place, id), entity, id, job_id, state, whole
            from wanted
            returning seq, entity, entity_id
          )
          select seq, entity, entity_id from written order by seq;
        get diagnostics v_count = row_count;
        update public.shop_counter set seq = v_seq + v_count where shop_id = p_shop;
        perform pg_notify('farbench_change', json_build_object('shop', p_shop, 'seq', v_seq + v_count)::text);
      end
    $$;
    -- The rows that travel with a job; the later migrations that make these tables replace it.
    create function rows_of_job(p_shop uuid, p_job uuid)
      returns table (part integer, place bigint, entity text, id text, job_id uuid)
      language sql stable set search_path = pg_catalog, public, pg_temp as $$
      select 1, 0::bigint, ''::text, ''::text, null::uuid where false
    $$;
    revoke all on function take_changes(uuid, jsonb), rows_of_job(uuid, uuid) from public;
    grant execute on function take_changes(uuid, jsonb) to farbench_app;
  `.execute(db)
}

/**
 * The trigger behind demandChange. It runs as farbench_lookup, whose policy lets it read the log of
 * every shop: at commit app.shop_id may already name the next shop of the same transaction. The owner is
 * a member of farbench_lookup (to hand it functions), so the policy asks who acts, not who may.
 */
async function createDemand(db: Kysely<unknown>): Promise<void> {
  await sql`
    create policy for_check on change_log for select to farbench_lookup
      using (current_user = 'farbench_lookup');
    grant select on change_log to farbench_lookup;
    create function demand_change() returns trigger
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      declare v_row jsonb := to_jsonb(case when tg_op = 'DELETE' then old else new end);
      begin
        perform 1 from public.change_log c
          where c.shop_id = (v_row ->> 'shop_id')::uuid and c.entity = tg_argv[0]
            and c.entity_id = v_row ->> tg_argv[1] and c.written_by = pg_current_xact_id();
        if not found then
          raise exception '% of % % has no change number', tg_op, tg_argv[0], v_row ->> tg_argv[1]
            using errcode = 'FB002', table = tg_table_name;
        end if;
        return null;
      end
    $$;
    revoke all on function demand_change() from public;
    grant create, usage on schema public to farbench_lookup;
    alter function demand_change() owner to farbench_lookup;
    revoke create on schema public from farbench_lookup;
    grant usage on schema public to farbench_app;
  `.execute(db)
}
