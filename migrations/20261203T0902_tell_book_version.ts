import { type Kysely, sql } from 'kysely'

/** note_contact also takes down which version of the code book the phone holds: seen.bookVersion. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create or replace function note_contact(p_shop uuid, p_device uuid, p_seen jsonb) returns void
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
          canary = coalesce((p_seen ->> 'canary')::uuid, d.canary),
          book_version = coalesce((p_seen ->> 'bookVersion')::integer, d.book_version)
        where d.shop_id = p_shop and d.id = p_device;
      end
    $$;
  `.execute(db)
}
