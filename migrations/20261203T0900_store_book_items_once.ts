import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'
import { type Kysely, sql } from 'kysely'
import { oneOf, protect } from './support/protect'

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

/**
 * Items of the code book are stored once for each content: a version names them by the SHA-256 of their
 * canonical JSON (RFC 8785). What is being worked on is the draft, of which a shop has one.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await createContent(db)
  await moveBodies(db)
  await createDraft(db)
}

async function createContent(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table code_book_content (
      shop_id uuid not null references shop,
      hash text not null check (hash ~ '^[0-9a-f]{64}$'),
      kind text not null check (kind in ${oneOf(KINDS)}),
      item_id text not null,
      body jsonb not null,
      primary key (shop_id, hash)
    );
    alter table code_book_item add hash text check (hash ~ '^[0-9a-f]{64}$');
    -- based_on: the version it was made from. made_by: who brought the draft; null: the command line.
    -- unseparated: pairs of faults that no check tells apart, each with its reason (rule CB11).
    alter table code_book_version
      add based_on integer,
      add made_by uuid,
      add note text check (length(note) between 1 and 500),
      add unseparated jsonb not null default '[]',
      add foreign key (shop_id, based_on) references code_book_version (shop_id, version),
      add foreign key (shop_id, made_by) references person (shop_id, id);
  `.execute(db)
}

/** Every version there is keeps its items; row-level security, forced on the owner too, stands aside for it. */
async function moveBodies(db: Kysely<unknown>): Promise<void> {
  await sql`alter table code_book_item no force row level security`.execute(db)
  const { rows } = await sql<{ body: object }>`
    select shop_id, version, kind, item_id, body from code_book_item
  `.execute(db)
  const moved = rows.map((row) => ({ ...row, hash: hashOf(row.body) }))
  const moves = JSON.stringify(moved)
  await sql`
    insert into code_book_content (shop_id, hash, kind, item_id, body)
    select m.shop_id, m.hash, m.kind, m.item_id, m.body from jsonb_to_recordset(${moves}::jsonb)
      as m (shop_id uuid, hash text, kind text, item_id text, body jsonb)
    on conflict do nothing
  `.execute(db)
  await sql`
    update code_book_item i set hash = m.hash from jsonb_to_recordset(${moves}::jsonb)
      as m (shop_id uuid, version integer, kind text, item_id text, hash text)
    where i.shop_id = m.shop_id and i.version = m.version and i.kind = m.kind and i.item_id = m.item_id
  `.execute(db)
  await sql`
    alter table code_book_item force row level security;
    alter table code_book_item alter hash set not null, drop column body,
      add foreign key (shop_id, hash) references code_book_content (shop_id, hash);
    create index code_book_item_hash on code_book_item (shop_id, hash);
  `.execute(db)
  await protect(db, 'code_book_content', 'select, insert')
}

const hashOf = (body: object): string =>
  createHash('sha256')
    .update(canonicalize(body) ?? '', 'utf8')
    .digest('hex')

async function createDraft(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table code_book_draft (
      shop_id uuid primary key references shop,
      hash text not null check (hash ~ '^[0-9a-f]{64}$'),
      based_on integer,
      made_at timestamptz not null,
      made_by uuid,
      note text check (length(note) between 1 and 500),
      unseparated jsonb not null default '[]',
      foreign key (shop_id, based_on) references code_book_version (shop_id, version),
      foreign key (shop_id, made_by) references person (shop_id, id)
    );
    create table code_book_draft_item (
      shop_id uuid not null references code_book_draft on delete cascade,
      kind text not null check (kind in ${oneOf(KINDS)}),
      item_id text not null,
      place integer not null,
      hash text not null,
      primary key (shop_id, kind, item_id),
      foreign key (shop_id, hash) references code_book_content (shop_id, hash)
    );
  `.execute(db)
  await protect(db, 'code_book_draft', 'select, insert, delete')
  await protect(db, 'code_book_draft_item', 'select, insert, delete')
}
