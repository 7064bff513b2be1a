import { type Kysely, sql } from 'kysely'

/**
 * Tombstones go after their time (P10). `horizon`: the highest change number among those purged; a phone
 * that was last told something older may hold a row that is gone, and pulls anew.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table shop_counter add column horizon bigint not null default 0;
    -- Purges the tombstones from before p_before that lie under the horizon, then raises the horizon over
    -- those that the next run will purge: whoever pulls meanwhile has been told to pull anew. Answers how
    -- many numbers went and where the horizon stands.
    create function prune_changes(p_shop uuid, p_before timestamptz)
      returns table (purged bigint, horizon bigint, waiting boolean)
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      #variable_conflict use_column
      declare v_purged bigint; v_old bigint; v_new bigint;
      begin
        select c.horizon into v_old from public.shop_counter c where c.shop_id = p_shop;
        if not found then
          raise exception 'no counter for shop % in this transaction', p_shop using errcode = 'FB001';
        end if;
        with dead as (
          select t.entity, t.entity_id, t.seq from public.change_log t
          where t.shop_id = p_shop and t.state = 'deleted' and t.changed_at < p_before and t.seq <= v_old
            and not exists (select 1 from public.change_log l where l.shop_id = t.shop_id
              and l.entity = t.entity and l.entity_id = t.entity_id and l.seq > t.seq)
        ), gone as (
          delete from public.change_log c using dead d
          where c.shop_id = p_shop and c.entity = d.entity and c.entity_id = d.entity_id and c.seq <= d.seq
          returning 1
        )
        select count(*) into v_purged from gone;
        select max(t.seq) into v_new from public.change_log t
          where t.shop_id = p_shop and t.state = 'deleted' and t.changed_at < p_before and t.seq > v_old
            and not exists (select 1 from public.change_log l where l.shop_id = t.shop_id
              and l.entity = t.entity and l.entity_id = t.entity_id and l.seq > t.seq);
        if v_new is not null then
          update public.shop_counter set horizon = v_new where shop_id = p_shop;
        end if;
        return query select v_purged, coalesce(v_new, v_old), v_new is not null;
      end
    $$;
    revoke all on function prune_changes(uuid, timestamptz) from public;
    grant execute on function prune_changes(uuid, timestamptz) to farbench_app;
  `.execute(db)
}
