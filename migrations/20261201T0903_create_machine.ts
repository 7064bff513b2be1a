import { type Kysely, sql } from 'kysely'
import { demandChange, oneOf, protect } from './support/protect'

const KINDS = [
  'feature',
  'symptom',
  'fault',
  'check',
  'swap',
  'spn',
  'pcode',
  'failure',
  'setup',
  'part',
  'tool',
  'system',
  'circuit',
]

/** Machines with their models, the meters and bags, bookings, and the code book. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table machine_model (
      shop_id uuid not null references shop,
      id uuid not null,
      maker text not null,
      model text not null,
      features jsonb not null,
      spec_sheet jsonb,
      source text not null,
      updated_at timestamptz not null default now(),
      deleted_at timestamptz,
      primary key (shop_id, id)
    );
    create table machine (
      shop_id uuid not null references shop,
      id uuid not null,
      model_id uuid,
      unit_number text check (length(unit_number) <= 20),
      maker_typed text check (length(maker_typed) <= 60),
      model_typed text check (length(model_typed) <= 60),
      year integer check (year between 1950 and 2100),
      serial text check (length(serial) <= 30),
      hours double precision check (hours >= 0),
      features jsonb not null,
      fleet boolean not null,
      updated_at timestamptz not null default now(),
      deleted_at timestamptz,
      primary key (shop_id, id),
      foreign key (shop_id, model_id) references machine_model
    );
    create table meter_profile (
      shop_id uuid not null references shop,
      id uuid not null,
      name text not null check (length(name) between 1 and 80),
      functions jsonb not null,
      leads_ohm jsonb not null,
      per_kelvin double precision not null check (per_kelvin >= 0),
      source text not null,
      updated_at timestamptz not null default now(),
      deleted_at timestamptz,
      primary key (shop_id, id)
    );
    create table bag (
      shop_id uuid not null references shop,
      id uuid not null,
      person_id uuid not null,
      parts jsonb not null,
      tools text[] not null,
      meter_ids uuid[] not null,
      updated_at timestamptz not null default now(),
      deleted_at timestamptz,
      primary key (shop_id, id),
      unique (shop_id, person_id),
      foreign key (shop_id, person_id) references person
    );
    -- A machine let out: from, to, and the party that has it.
    create table booking (
      shop_id uuid not null references shop,
      id uuid not null,
      machine_id uuid not null,
      party_id uuid,
      from_at timestamptz not null,
      to_at timestamptz not null,
      zone text not null check (length(zone) between 1 and 64),
      state text not null check (state in ${oneOf(['booked', 'out', 'back', 'cancelled'])}),
      primary key (shop_id, id),
      check (to_at > from_at),
      foreign key (shop_id, machine_id) references machine,
      foreign key (shop_id, party_id) references party
    );
    create index booking_machine on booking (shop_id, machine_id, from_at);

    create table code_book_version (
      shop_id uuid not null references shop,
      version integer not null check (version >= 1),
      hash text not null check (hash ~ '^[0-9a-f]{64}$'),
      published_at timestamptz not null,
      published_by uuid,
      primary key (shop_id, version),
      foreign key (shop_id, published_by) references person
    );
    create table code_book_item (
      shop_id uuid not null,
      version integer not null,
      kind text not null check (kind in ${oneOf(KINDS)}),
      item_id text not null,
      place integer not null,
      body jsonb not null,
      primary key (shop_id, version, kind, item_id),
      foreign key (shop_id, version) references code_book_version
    );
  `.execute(db)
  await protect(db, 'machine_model', 'select, insert, update')
  await protect(db, 'machine', 'select, insert, update')
  await protect(db, 'meter_profile', 'select, insert, update')
  await protect(db, 'bag', 'select, insert, update')
  await protect(db, 'booking', 'select, insert, update')
  // A published version is never changed: the next one replaces it.
  await protect(db, 'code_book_version', 'select, insert')
  await protect(db, 'code_book_item', 'select, insert')
  await demandChange(db, { table: 'machine_model', entity: 'machineModel', column: 'id' })
  await demandChange(db, { table: 'machine', entity: 'machine', column: 'id' })
  await demandChange(db, { table: 'meter_profile', entity: 'meterProfile', column: 'id' })
  await demandChange(db, { table: 'bag', entity: 'bag', column: 'id' })
  await demandChange(db, { table: 'code_book_version', entity: 'book', column: 'version' })
}
