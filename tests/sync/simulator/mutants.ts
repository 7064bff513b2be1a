// Wrong programs that the simulator has to find: the cursors of the measurements behind P7, and a shop
// that does not look whether an op came before. Each is put in place in a test's own database or between
// the program and PostgreSQL; the product has no switch for any of them.
import pg from 'pg'
import type { TestDatabase } from '../../support/database'
import { wait } from '../../support/writers'
import { type Rewrite, setHook } from './statements'

export type Mutant = {
  name: string
  what: string
  /** Replaces functions of the database. */
  sql?: string
  /** Comes between the program and its statements. */
  rewrite?: (db: TestDatabase) => Rewrite
  /** Rules that see it by the way; without them the promise to the phone itself has to break. */
  without: readonly string[]
  /** Wrong cursors must lose rows in the torture as well. */
  isCursor: boolean
  /** The promise that breaks. */
  breaks: RegExp
}

/** A cursor on numbers that are taken without a lock reads up to the highest number it sees. */
const readHighest: Rewrite = ({ text, values, run }) =>
  run(
    /from "shop_counter"/.test(text) && /"seq"/.test(text) && !/for update/.test(text)
      ? text.replace(
          '"seq"',
          '(select coalesce(max(l.seq), 0) from change_log l where l.shop_id = "shop_counter"."shop_id") as "seq"',
        )
      : text,
    values,
  )

const HEAD = 'language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$'
const NO_LOCK = `
  create or replace function lock_counter(p_shop uuid) returns bigint ${HEAD}
  begin return (select coalesce(max(seq), 0) from public.change_log where shop_id = p_shop); end $$;`

/** Where a writer says that it is about to write, it draws a thousand numbers and locks nothing yet. */
const RESERVE = `
  create or replace function lock_counter(p_shop uuid) returns bigint ${HEAD}
  begin
    if coalesce(current_setting('sim.reserved', true), '') = '' then
      perform set_config('sim.reserved', (nextval('public.naive_seq') * 1000)::text, true);
    end if;
    return (select seq from public.shop_counter where shop_id = p_shop);
  end $$;`

/** take_changes with other numbers: `numbers` says which, `after` what happens once they are written. */
const takeBy = ({
  before = '',
  number,
  after = '',
}: {
  before?: string
  number: string
  after?: string
}) => `
  create or replace function take_changes(p_shop uuid, p_changes jsonb)
    returns table (seq bigint, entity text, entity_id text) ${HEAD}
    #variable_conflict use_column
    declare v_row record; v_seq bigint; v_rows jsonb := '[]';
    begin
      if jsonb_array_length(p_changes) = 0 then return; end if;
      ${before}
      for v_row in
        with given as (
          select o.n, 0 as part, 0::bigint as place, c.entity, c.id, c."jobId" as job_id,
            coalesce(c.state, 'present') as state, coalesce(c.whole, false) as whole
          from jsonb_array_elements(p_changes) with ordinality o (value, n)
            cross join lateral jsonb_to_record(o.value)
              as c (entity text, id text, "jobId" uuid, state text, whole boolean)
        )
        select * from given
        union all
        select g.n, r.part, r.place, r.entity, r.id, r.job_id, g.state, false
        from given g cross join lateral public.rows_of_job(p_shop, g.job_id) r
        where g.whole and g.entity = 'job'
        order by 1, 2, 3, 5
      loop
        v_seq := ${number};
        v_rows := v_rows || jsonb_build_object('seq', v_seq, 'row', to_jsonb(v_row));
      end loop;
      ${after}
      return query
        insert into public.change_log (shop_id, seq, entity, entity_id, job_id, state, whole)
        select p_shop, (r.value ->> 'seq')::bigint, r.value -> 'row' ->> 'entity', r.value -> 'row' ->> 'id',
          (r.value -> 'row' ->> 'job_id')::uuid, r.value -> 'row' ->> 'state', (r.value -> 'row' ->> 'whole')::boolean
        from jsonb_array_elements(v_rows) r (value)
        returning seq, entity, entity_id;
    end $$;`

const SEQUENCE = `
  create sequence naive_seq start 100000;
  alter sequence naive_seq owner to farbench_owner;`

/** How long the second statement is on its way (a choice): outside of a race nothing else holds it up. */
const SLOW_MS = 4

/** The horizon is read in a statement of its own, after the rows: rows and horizon are of two moments. */
function lateHorizon(db: TestDatabase): Rewrite {
  const snapshots = new WeakMap<pg.Client, pg.Client>()
  return async ({ client, text, values, run, gate }) => {
    if (/from "shop_counter"/.test(text) && /"horizon"/.test(text)) {
      const shop = values[0]
      const snapshot = await openSnapshot(db.appUrl, client, shop)
      await snapshots.get(client)?.end()
      snapshots.set(client, snapshot)
      await gate('between rows and horizon')
      await wait(SLOW_MS)
      return await run(text, values)
    }
    const snapshot = snapshots.get(client)
    if (snapshot === undefined || !/from change_log c\b[\s\S]*cross join lateral/.test(text)) {
      return await run(text, values)
    }
    snapshots.delete(client)
    try {
      return await snapshot.query(text, values)
    } finally {
      await snapshot.end()
    }
  }
}

async function openSnapshot(url: string, like: pg.Client, shop: unknown): Promise<pg.Client> {
  const { _types } = like as unknown as { _types: pg.CustomTypesConfig }
  const snapshot = new pg.Client({ connectionString: url, types: _types })
  snapshot.on('error', () => undefined)
  await snapshot.connect()
  await snapshot.query('begin isolation level repeatable read')
  await snapshot.query(`select set_config('app.shop_id', $1, true)`, [shop])
  await snapshot.query('select 1 from shop_counter')
  return snapshot
}

/** Nobody looks whether an op came before. */
const forgetful: Rewrite = async ({ text, values, run }) => {
  const isLookUp = /^select .* from "sync_op" where .*"op_id" = any\(/.test(text)
  if (!isLookUp) return await run(text, values)
  const answer = await run(text, values)
  return Object.assign(answer, { rows: [], rowCount: 0 })
}

export const MUTANTS: Mutant[] = [
  {
    name: 'bigserial',
    what: 'the cursor is a plain sequence',
    sql: SEQUENCE + NO_LOCK + takeBy({ number: `nextval('public.naive_seq')` }),
    rewrite: () => readHighest,
    without: ['dense'],
    isCursor: true,
    breaks: /^(pulledIsVisible|everybodyConverges|photoIsSent)$/,
  },
  {
    name: 'updatedAt',
    what: 'the cursor is the time at which the writing transaction began',
    sql:
      SEQUENCE +
      NO_LOCK +
      takeBy({
        number: `(extract(epoch from now()) * 1000000)::bigint + jsonb_array_length(v_rows)
          + (select count(*) from public.change_log where written_by = pg_current_xact_id())`,
      }),
    rewrite: () => readHighest,
    without: ['dense'],
    isCursor: true,
    breaks: /^(pulledIsVisible|everybodyConverges|photoIsSent)$/,
  },
  {
    name: 'lockAfterNextval',
    what: 'the lock is taken after the numbers',
    sql:
      SEQUENCE +
      RESERVE +
      takeBy({
        before: `perform public.lock_counter(p_shop);
          v_seq := current_setting('sim.reserved')::bigint;
          perform 1 from public.shop_counter where shop_id = p_shop for update;`,
        number: 'v_seq + 1',
        after: `perform set_config('sim.reserved', v_seq::text, true);
          update public.shop_counter set seq = greatest(seq, v_seq) where shop_id = p_shop;`,
      }),
    without: ['dense'],
    isCursor: true,
    breaks: /^(pulledIsVisible|everybodyConverges|photoIsSent)$/,
  },
  {
    name: 'lateHorizon',
    what: 'the horizon of a pull is read after its rows',
    rewrite: lateHorizon,
    without: [],
    isCursor: true,
    breaks: /^(pulledIsVisible|everybodyConverges|photoIsSent)$/,
  },
  {
    name: 'noDeduplication',
    what: 'an op that comes again is judged anew',
    rewrite: () => forgetful,
    without: [],
    isCursor: false,
    breaks: /^(acceptedIsNotRefused|refusedForAReason|once)$/,
  },
]

/** Puts the wrong program in place in this database, for as long as it lives. */
export async function infect(db: TestDatabase, mutant: Mutant): Promise<void> {
  const admin = new pg.Client({ connectionString: db.adminUrl })
  await admin.connect()
  if (mutant.sql !== undefined) await admin.query(mutant.sql)
  await admin.end()
  setHook({ rewrite: mutant.rewrite?.(db) ?? null })
}

/** The right program again. */
export const heal = (): void => setHook({ rewrite: null })
