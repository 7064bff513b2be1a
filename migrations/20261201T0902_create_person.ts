import { type Kysely, sql } from 'kysely'
import { demandChange, oneOf, protect } from './support/protect'

const ROLES = ['mechanic', 'guide', 'dispatcher', 'parts', 'owner']

/** People. Names, phones and e-mails lie in person_contact alone, so that they can be erased (R23). */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table person (
      shop_id uuid not null references shop,
      id uuid not null,
      created_at timestamptz not null default now(),
      erased_at timestamptz,
      deleted_at timestamptz,
      primary key (shop_id, id)
    );
    create table person_contact (
      shop_id uuid not null,
      person_id uuid not null,
      name text check (length(name) <= 120),
      phone text check (length(phone) <= 40),
      email text check (length(email) <= 200),
      primary key (shop_id, person_id),
      foreign key (shop_id, person_id) references person
    );
    create unique index person_contact_email on person_contact (shop_id, lower(email));
    create index person_contact_sign_in on person_contact (lower(email));

    -- scope_version moves with the roles: a phone's older cursor is answered with a reset (P11).
    create table membership (
      shop_id uuid not null,
      person_id uuid not null,
      roles text[] not null check (roles <@ array[${sql.raw(ROLES.map((role) => `'${role}'`).join(','))}]),
      scope_version integer not null default 1,
      created_at timestamptz not null default now(),
      revoked_at timestamptz,
      primary key (shop_id, person_id),
      foreign key (shop_id, person_id) references person
    );
    create function move_scope() returns trigger language plpgsql as $$
      begin
        if new.roles is distinct from old.roles or new.revoked_at is distinct from old.revoked_at then
          new.scope_version := old.scope_version + 1;
        end if;
        return new;
      end
    $$;
    create trigger move_scope before update on membership for each row execute function move_scope();

    -- How a person proves who it is; password_hash names its method and cost.
    create table credential (
      shop_id uuid not null,
      person_id uuid not null,
      password_hash text not null,
      changed_at timestamptz not null default now(),
      primary key (shop_id, person_id),
      foreign key (shop_id, person_id) references person
    );
    create table session (
      shop_id uuid not null,
      id uuid not null,
      person_id uuid not null,
      created_at timestamptz not null,
      expires_at timestamptz not null,
      revoked_at timestamptz,
      primary key (shop_id, id),
      foreign key (shop_id, person_id) references person
    );
    create index session_person on session (shop_id, person_id);

    -- A phone of one person in one shop (R22): its public key as JWK, how far its ops have come.
    create table device (
      shop_id uuid not null,
      id uuid not null,
      person_id uuid not null,
      name text not null check (length(name) <= 120),
      public_key jsonb not null,
      highest_dseq bigint not null default 0,
      enrolled_at timestamptz not null,
      last_seen_at timestamptz,
      clock_offset_ms bigint,
      revoked_at timestamptz,
      revoked_by uuid,
      primary key (shop_id, id),
      foreign key (shop_id, person_id) references person,
      foreign key (shop_id, revoked_by) references person (shop_id, id)
    );

    -- Riders, owners, payers and site contacts of jobs and bookings (R9).
    create table party (
      shop_id uuid not null references shop,
      id uuid not null,
      kind text not null check (kind in ${oneOf(['rider', 'machineOwner', 'payer', 'siteContact', 'hirer'])}),
      created_at timestamptz not null default now(),
      erased_at timestamptz,
      primary key (shop_id, id)
    );
    create table party_contact (
      shop_id uuid not null,
      party_id uuid not null,
      name text check (length(name) <= 120),
      phone text check (length(phone) <= 40),
      email text check (length(email) <= 200),
      primary key (shop_id, party_id),
      foreign key (shop_id, party_id) references party
    );
  `.execute(db)
  await protect(db, 'person', 'select, insert, update')
  await protect(db, 'person_contact', 'select, insert, update, delete')
  await protect(db, 'membership', 'select, insert, update')
  await protect(db, 'credential', 'select, insert, update, delete')
  await protect(db, 'session', 'select, insert, update')
  await protect(db, 'device', 'select, insert, update')
  await protect(db, 'party', 'select, insert, update')
  await protect(db, 'party_contact', 'select, insert, update, delete')
  await demandChange(db, { table: 'person', entity: 'person', column: 'id' })
  await demandChange(db, { table: 'person_contact', entity: 'person', column: 'person_id' })
  await demandChange(db, { table: 'membership', entity: 'person', column: 'person_id' })
  await createSignIn(db)
}

/**
 * The two questions asked before a shop is known. They run as farbench_lookup, which owns nothing
 * else and reads just these five tables by policy; the app role may only call them.
 */
async function createSignIn(db: Kysely<unknown>): Promise<void> {
  for (const table of ['person_contact', 'membership', 'credential', 'session', 'shop']) {
    await sql`
      create policy for_sign_in on ${sql.table(table)} for select to farbench_lookup
        using (current_user = 'farbench_lookup');
      grant select on ${sql.table(table)} to farbench_lookup;
    `.execute(db)
  }
  await sql`
    -- Everyone with this e-mail address, one row per shop, with the hash to check.
    create function find_sign_in(p_email text)
      returns table (shop_id uuid, person_id uuid, name text, roles text[], password_hash text)
      language sql stable security definer set search_path = pg_catalog, public, pg_temp as $$
      select m.shop_id, m.person_id, c.name, m.roles, k.password_hash
      from public.person_contact c
        join public.membership m on m.shop_id = c.shop_id and m.person_id = c.person_id
        join public.credential k on k.shop_id = c.shop_id and k.person_id = c.person_id
      where lower(c.email) = lower(p_email) and m.revoked_at is null
      order by m.shop_id
    $$;
    -- Whose session this is, as long as neither it nor the membership was revoked.
    create function find_session(p_id uuid, p_now timestamptz)
      returns table (shop_id uuid, person_id uuid, name text, roles text[])
      language sql stable security definer set search_path = pg_catalog, public, pg_temp as $$
      select s.shop_id, s.person_id, c.name, m.roles
      from public.session s
        join public.membership m on m.shop_id = s.shop_id and m.person_id = s.person_id
        left join public.person_contact c on c.shop_id = s.shop_id and c.person_id = s.person_id
      where s.id = p_id and s.revoked_at is null and s.expires_at > p_now and m.revoked_at is null
    $$;
    create index session_id on session (id);
    revoke all on function find_sign_in(text), find_session(uuid, timestamptz) from public;
    grant execute on function find_sign_in(text), find_session(uuid, timestamptz) to farbench_app;
    grant create on schema public to farbench_lookup;
    alter function find_sign_in(text) owner to farbench_lookup;
    alter function find_session(uuid, timestamptz) owner to farbench_lookup;
    revoke create on schema public from farbench_lookup;
  `.execute(db)
}
