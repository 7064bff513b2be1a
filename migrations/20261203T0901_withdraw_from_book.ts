import { type Kysely, sql } from 'kysely'
import { demandChange, protect } from './support/protect'

/**
 * Safety withdrawals from the code book (R23) and who acknowledged them. `hashes`: every content the item ever
 * had in a published version, so that it holds in each of them; a later, other content is not withdrawn. Also
 * which version of the book a phone says it holds.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table code_book_withdrawal (
      shop_id uuid not null references shop,
      id uuid not null,
      what text not null check (what in ('check', 'swap', 'fault', 'limit', 'version')),
      item_id text,
      version integer,
      name text not null check (length(name) between 1 and 120),
      hashes text[] not null,
      reason text not null check (length(reason) between 1 and 500),
      instead text check (length(instead) between 1 and 500),
      withdrawn_at timestamptz not null,
      withdrawn_by uuid,
      primary key (shop_id, id),
      check ((what = 'version') = (version is not null)),
      check ((what = 'version') = (item_id is null)),
      foreign key (shop_id, version) references code_book_version (shop_id, version),
      foreign key (shop_id, withdrawn_by) references person (shop_id, id)
    );
    create unique index code_book_withdrawal_version on code_book_withdrawal (shop_id, version)
      where version is not null;
    create table code_book_heard (
      shop_id uuid not null,
      withdrawal_id uuid not null,
      person_id uuid not null,
      device_id uuid not null,
      heard_at timestamptz not null,
      received_at timestamptz not null,
      primary key (shop_id, withdrawal_id, person_id),
      foreign key (shop_id, withdrawal_id) references code_book_withdrawal (shop_id, id),
      foreign key (shop_id, person_id) references person (shop_id, id),
      foreign key (shop_id, device_id) references device (shop_id, id)
    );
    alter table device add book_version integer check (book_version >= 1);
  `.execute(db)
  await protect(db, 'code_book_withdrawal', 'select, insert')
  await protect(db, 'code_book_heard', 'select, insert')
  await demandChange(db, {
    table: 'code_book_withdrawal',
    entity: 'bookWithdrawal',
    column: 'id',
  })
  await demandChange(db, {
    table: 'code_book_heard',
    entity: 'bookWithdrawal',
    column: 'withdrawal_id',
  })
}
