import { type Kysely, sql } from 'kysely'

/**
 * What nearly every exchange with a phone asks and writes, each as one statement: a plan that is made once
 * for a connection, no round trip between, and the shop's counter held for the writing alone. They run as
 * whoever calls them, so that row-level security holds in them as everywhere.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await createContact(db)
  await createOpen(db)
  await createEvidence(db)
  await lightenDemand(db)
}

/**
 * note_contact(shop, device, seen): that a phone was heard, and what it told of itself; what it did not tell
 * stays. seen = {at, clockOffsetMs?, highestDseq?, canary?, held?: {ops, photos, oldestAt}}.
 */
async function createContact(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function note_contact(p_shop uuid, p_device uuid, p_seen jsonb) returns void
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      declare
        v_held jsonb := nullif(p_seen -> 'held', 'null'::jsonb);
        v_at timestamptz := (p_seen ->> 'at')::timestamptz;
      begin
        update public.device d set
          last_seen_at = v_at,
          clock_offset_ms = coalesce((p_seen ->> 'clockOffsetMs')::bigint, d.clock_offset_ms),
          highest_dseq = greatest(d.highest_dseq, (p_seen ->> 'highestDseq')::bigint),
          held_ops = case when v_held is null then d.held_ops else (v_held ->> 'ops')::integer end,
          held_photos = case when v_held is null then d.held_photos else (v_held ->> 'photos')::integer end,
          held_oldest_at =
            case when v_held is null then d.held_oldest_at else (v_held ->> 'oldestAt')::timestamptz end,
          held_told_at = case when v_held is null then d.held_told_at else v_at end,
          canary = coalesce((p_seen ->> 'canary')::uuid, d.canary)
        where d.shop_id = p_shop and d.id = p_device;
      end
    $$;
    revoke all on function note_contact(uuid, uuid, jsonb) from public;
    grant execute on function note_contact(uuid, uuid, jsonb) to farbench_app;
  `.execute(db)
}

/**
 * open_exchange(shop, device, session, now, seen): a phone and the person behind it, whose session came with
 * it, and where the shop's log stands. With seen, a phone that may write and speaks out of the store that
 * is known is noted as heard by the same statement (noted), and its commit does not wait for the disk. It
 * binds the transaction to the shop, so that it is called as the only statement of one.
 */
async function createOpen(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function open_exchange(p_shop uuid, p_device uuid, p_session uuid, p_now timestamptz, p_seen jsonb)
      returns table (id uuid, person_id uuid, name text, public_key jsonb, highest_dseq bigint,
        enrolled_at timestamptz, last_seen_at timestamptz, clock_offset_ms bigint, revoked_at timestamptz,
        revoked_roles text[], canary uuid, gaps_told_at timestamptz, replaced_by uuid,
        wipe_told_at timestamptz, roles text[], is_member boolean, person_name text, scope_version integer,
        session_shop uuid, session_person uuid, session_name text, session_roles text[],
        epoch text, seq bigint, horizon bigint, noted boolean)
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      #variable_conflict use_column
      declare v_noted boolean := false;
      begin
        perform set_config('app.shop_id', p_shop::text, true);
        if p_seen is not null then
          perform 1 from public.device d where d.shop_id = p_shop and d.id = p_device
            and d.revoked_at is null and coalesce(d.canary = (p_seen ->> 'canary')::uuid, true);
          v_noted := found;
        end if;
        if v_noted then
          perform set_config('synchronous_commit', 'off', true);
          perform public.note_contact(p_shop, p_device, p_seen);
        end if;
        return query
          select d.id, d.person_id, d.name, d.public_key, d.highest_dseq, d.enrolled_at, d.last_seen_at,
            d.clock_offset_ms, d.revoked_at, d.revoked_roles, d.canary, d.gaps_told_at, d.replaced_by,
            d.wipe_told_at, m.roles, m.revoked_at is null and p.deleted_at is null, c.name, m.scope_version,
            s.shop_id, s.person_id, s.name, s.roles, n.epoch, n.seq, n.horizon, v_noted
          from public.device d
            join public.shop_counter n on n.shop_id = d.shop_id
            left join public.membership m on m.shop_id = d.shop_id and m.person_id = d.person_id
            left join public.person p on p.shop_id = d.shop_id and p.id = d.person_id
            left join public.person_contact c on c.shop_id = d.shop_id and c.person_id = d.person_id
            left join public.find_session(p_session, p_now) s on true
          where d.shop_id = p_shop and d.id = p_device;
      end
    $$;
    -- As it was, with a plan that is kept.
    create or replace function find_session(p_id uuid, p_now timestamptz)
      returns table (shop_id uuid, person_id uuid, name text, roles text[])
      language plpgsql stable security definer set search_path = pg_catalog, public, pg_temp as $$
      #variable_conflict use_column
      begin
        return query select s.shop_id, s.person_id, c.name, m.roles
          from public.session s
            join public.membership m on m.shop_id = s.shop_id and m.person_id = s.person_id
            left join public.person_contact c on c.shop_id = s.shop_id and c.person_id = s.person_id
          where s.id = p_id and s.revoked_at is null and s.expires_at > p_now and m.revoked_at is null;
      end
    $$;
    revoke all on function open_exchange(uuid, uuid, uuid, timestamptz, jsonb) from public;
    grant execute on function open_exchange(uuid, uuid, uuid, timestamptz, jsonb) to farbench_app;
  `.execute(db)
}

/**
 * take_evidence(shop, read_at, jobs, rows, ops, received_at, entries, stored, changes): locks the counter and
 * writes entries that only add to jobs, their ops and their change numbers; or nothing (taken = false), when
 * one of these ops came meanwhile, or since read_at one of these jobs, something that travels with one, one
 * of these rows, or the code book changed. locked_ms: when the counter was locked, ms since 1970.
 */
async function createEvidence(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function take_evidence(p_shop uuid, p_read_at bigint, p_jobs uuid[], p_rows text[], p_ops text[],
      p_received_at timestamptz, p_entries json, p_stored json, p_changes jsonb)
      returns table (taken boolean, locked_ms double precision)
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      declare v_seq bigint; v_locked double precision;
      begin
        v_seq := public.lock_counter(p_shop);
        v_locked := extract(epoch from clock_timestamp()) * 1000;
        if exists (select 1 from public.sync_op o where o.shop_id = p_shop and o.op_id = any(p_ops))
          or (v_seq <> p_read_at and public.is_touched(p_shop, p_read_at, p_jobs, p_rows)) then
          return query select false, v_locked;
          return;
        end if;
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
        perform public.save_ops(p_shop, p_stored);
        perform 1 from public.take_changes(p_shop, p_changes);
        return query select true, v_locked;
      end
    $$;
    create function is_touched(p_shop uuid, p_after bigint, p_jobs uuid[], p_rows text[]) returns boolean
      language sql stable set search_path = pg_catalog, public, pg_temp as $$
      select exists (select 1 from public.change_log c
        where c.shop_id = p_shop and c.seq > p_after
          and (c.job_id = any(p_jobs) or c.entity_id = any(p_rows) or c.entity = 'book'))
    $$;
    -- A final outcome never changes (P6).
    create function save_ops(p_shop uuid, p_stored json) returns void
      language plpgsql set search_path = pg_catalog, public, pg_temp as $$
      begin
      insert into public.sync_op (shop_id, op_id, device_id, dseq, person_id, kind, entity_id, job_id, raw,
        outcome, code, field, detail, blocked_on, loser, received_at, settled_at)
      select p_shop, o."opId", o."deviceId", o.dseq, o."personId", o.kind, o."entityId", o."jobId", o.raw,
        o.outcome, o.code, o.field, o.detail, o."blockedOn", nullif(o.loser, 'null'::jsonb),
        o."receivedAt", o."settledAt"
      from json_to_recordset(p_stored) as o ("opId" text, "deviceId" uuid, dseq bigint, "personId" uuid,
        kind text, "entityId" text, "jobId" uuid, raw text, outcome text, code text, field text,
        detail text, "blockedOn" text, loser jsonb, "receivedAt" timestamptz, "settledAt" timestamptz)
      on conflict (shop_id, op_id) do update set
        outcome = excluded.outcome, code = excluded.code, field = excluded.field,
        detail = excluded.detail, blocked_on = excluded.blocked_on, loser = excluded.loser,
        settled_at = excluded.settled_at
      where sync_op.outcome in ('blocked', 'quarantined');
      end
    $$;
    revoke all on function is_touched(uuid, bigint, uuid[], text[]), save_ops(uuid, json),
      take_evidence(uuid, bigint, uuid[], text[], text[], timestamptz, json, json, jsonb) from public;
    grant execute on function is_touched(uuid, bigint, uuid[], text[]), save_ops(uuid, json),
      take_evidence(uuid, bigint, uuid[], text[], text[], timestamptz, json, json, jsonb) to farbench_app;
  `.execute(db)
}

/** The check of each row at commit without turning the row into JSON, as a batch has hundreds. */
async function lightenDemand(db: Kysely<unknown>): Promise<void> {
  await sql`
    create or replace function demand_change() returns trigger
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      declare v_shop uuid; v_id text; v_row jsonb;
      begin
        if tg_argv[1] = 'id' and tg_op <> 'DELETE' then
          v_shop := new.shop_id;
          v_id := new.id;
        else
          v_row := to_jsonb(case when tg_op = 'DELETE' then old else new end);
          v_shop := v_row ->> 'shop_id';
          v_id := v_row ->> tg_argv[1];
        end if;
        perform 1 from public.change_log c
          where c.shop_id = v_shop and c.entity = tg_argv[0] and c.entity_id = v_id
            and c.written_by = pg_current_xact_id();
        if not found then
          raise exception '% of % % has no change number', tg_op, tg_argv[0], v_id
            using errcode = 'FB002', table = tg_table_name;
        end if;
        return null;
      end
    $$;
  `.execute(db)
}
