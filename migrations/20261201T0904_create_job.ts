import { type Kysely, sql } from 'kysely'
import { demandChange, oneOf, protect } from './support/protect'

const JOB_STATES = [
  'called',
  'open',
  'assigned',
  'underWay',
  'waitingParts',
  'waitingApproval',
  'waitingRetrieval',
  'closed',
]
const PEOPLE_STATES = ['withMachine', 'onTheWay', 'beingFetched', 'safe']
const MACHINE_STATES = ['stranded', 'runs', 'limping', 'onTow', 'leftBehind', 'atShop']
const WAYS_OUT = ['repairHere', 'limpOut', 'tow', 'returnLater']
const LINE_STATES = [
  'asked',
  'identified',
  'quoted',
  'ordered',
  'promised',
  'received',
  'allocated',
  'dispatched',
  'fitted',
  'returned',
  'credited',
  'cancelled',
]

/** A job with people state and machine state apart (R2, R13), and what hangs on it. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table job (
      shop_id uuid not null references shop,
      id uuid not null,
      number text not null check (number ~ '^J-[0-9]{4,}$'),
      machine_id uuid not null,
      people jsonb not null,
      place jsonb,
      complaint jsonb not null,
      before jsonb not null,
      air_temp_c double precision,
      weather text check (length(weather) <= 120),
      opened_at timestamptz not null,
      zone text not null check (length(zone) between 1 and 64),
      opened_by uuid not null,
      opened_on uuid,
      received_at timestamptz not null default now(),
      state text not null check (state in ${oneOf(JOB_STATES)}),
      people_state text not null check (people_state in ${oneOf(PEOPLE_STATES)}),
      machine_state text not null check (machine_state in ${oneOf(MACHINE_STATES)}),
      way_out text check (way_out in ${oneOf(WAYS_OUT)}),
      closed_at timestamptz,
      closed_on uuid,
      -- Set 60 days after closing: from then on no phone holds the job (R22).
      left_field_at timestamptz,
      deleted_at timestamptz,
      primary key (shop_id, id),
      unique (shop_id, number),
      check ((state = 'closed') = (closed_at is not null)),
      check (closed_on is null or state = 'closed'),
      foreign key (shop_id, machine_id) references machine,
      foreign key (shop_id, opened_by) references person (shop_id, id),
      foreign key (shop_id, opened_on) references device (shop_id, id),
      foreign key (shop_id, closed_on) references device (shop_id, id)
    );
    create index job_board on job (shop_id, state, opened_at desc);
    create index job_machine on job (shop_id, machine_id);

    create table job_assignment (
      shop_id uuid not null,
      job_id uuid not null,
      person_id uuid not null,
      assigned_at timestamptz not null default now(),
      primary key (shop_id, job_id, person_id),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, person_id) references person
    );
    create index job_assignment_person on job_assignment (shop_id, person_id);

    create table part_request (
      shop_id uuid not null,
      id uuid not null,
      job_id uuid not null,
      asked_at timestamptz not null,
      asked_by uuid not null,
      asked_on uuid,
      urgency text not null check (urgency in ('now', 'today', 'thisWeek')),
      note text check (length(note) <= 500),
      advice jsonb,
      received_at timestamptz not null default now(),
      deleted_at timestamptz,
      primary key (shop_id, id),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, asked_by) references person (shop_id, id),
      foreign key (shop_id, asked_on) references device (shop_id, id)
    );
    create index part_request_job on part_request (shop_id, job_id);
    create table part_line (
      shop_id uuid not null,
      id uuid not null,
      request_id uuid not null,
      line_no integer not null check (line_no >= 1),
      part text not null,
      words text not null check (length(words) between 1 and 120),
      position text check (length(position) <= 60),
      quantity integer not null check (quantity between 1 and 999),
      choice text not null check (choice in ('genuine', 'aftermarket', 'either')),
      number text check (length(number) <= 40),
      price_minor bigint,
      price_currency text check (price_currency ~ '^[A-Z]{3}$'),
      condemned_by uuid,
      state text not null default 'asked' check (state in ${oneOf(LINE_STATES)}),
      primary key (shop_id, id),
      unique (shop_id, request_id, line_no),
      check ((price_minor is null) = (price_currency is null)),
      foreign key (shop_id, request_id) references part_request
    );

    -- The bytes lie in the file store under the hash; a row says that they came and were verified.
    create table photo (
      shop_id uuid not null,
      hash text not null check (hash ~ '^[0-9a-f]{64}$'),
      job_id uuid not null,
      bytes integer not null check (bytes between 1 and 5000000),
      mime text not null check (mime in ('image/jpeg', 'image/webp', 'image/png')),
      received_at timestamptz not null,
      received_from uuid,
      primary key (shop_id, hash),
      foreign key (shop_id, job_id) references job,
      foreign key (shop_id, received_from) references device (shop_id, id)
    );
    create index photo_job on photo (shop_id, job_id);
  `.execute(db)
  await protect(db, 'job', 'select, insert, update')
  await protect(db, 'job_assignment', 'select, insert, delete')
  await protect(db, 'part_request', 'select, insert, update')
  await protect(db, 'part_line', 'select, insert, update')
  await protect(db, 'photo', 'select, insert')
  await demandChange(db, { table: 'job', entity: 'job', column: 'id' })
  await demandChange(db, { table: 'job_assignment', entity: 'job', column: 'job_id' })
  await demandChange(db, { table: 'part_request', entity: 'partRequest', column: 'id' })
  await demandChange(db, { table: 'part_line', entity: 'partRequest', column: 'request_id' })
  await demandChange(db, { table: 'photo', entity: 'photo', column: 'hash' })
  await demandWhole(db)
}

/**
 * Closing, reopening, deleting, taking a job off the phones and every assignment change who may hold
 * its rows: then the change must be `whole`, so that every row of it travels again (P11).
 */
async function demandWhole(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function demand_whole() returns trigger
      language plpgsql security definer set search_path = pg_catalog, public, pg_temp as $$
      declare v_row jsonb := to_jsonb(case when tg_op = 'DELETE' then old else new end);
        v_job text := v_row ->> tg_argv[0];
      begin
        perform 1 from public.change_log c
          where c.shop_id = (v_row ->> 'shop_id')::uuid and c.entity = 'job' and c.entity_id = v_job
            and c.whole and c.written_by = pg_current_xact_id();
        if not found then
          raise exception 'job % changed scope without a whole change', v_job using errcode = 'FB003';
        end if;
        return null;
      end
    $$;
    revoke all on function demand_whole() from public;
    grant create on schema public to farbench_lookup;
    alter function demand_whole() owner to farbench_lookup;
    revoke create on schema public from farbench_lookup;
    create constraint trigger whole_change after update on job deferrable initially deferred for each row
      when ((old.state = 'closed') is distinct from (new.state = 'closed')
        or old.left_field_at is distinct from new.left_field_at
        or old.deleted_at is distinct from new.deleted_at)
      execute function demand_whole('id');
    create constraint trigger whole_change after insert or delete on job_assignment
      deferrable initially deferred for each row execute function demand_whole('job_id');
  `.execute(db)
}
