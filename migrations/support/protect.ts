import { type Kysely, sql } from 'kysely'

/**
 * Binds a table to its shop: row-level security, forced on the owner as well, and the app role's
 * grants. Used by migrations only and frozen with them: change it by writing another one.
 */
export async function protect(db: Kysely<unknown>, table: string, grants: string): Promise<void> {
  const name = sql.table(table)
  await sql`
    alter table ${name} enable row level security;
    alter table ${name} force row level security;
    create policy of_shop on ${name}
      using (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid)
      with check (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid);
    grant ${sql.raw(grants)} on ${name} to farbench_app;
  `.execute(db)
}

/** A check constraint's list, `('a','b')`, of a tuple of lib/model as it stood at this migration. */
export const oneOf = (values: readonly string[]) =>
  sql.raw(`(${values.map((value) => `'${value.replaceAll("'", "''")}'`).join(', ')})`)

/**
 * Every insert, update or delete of a pulled table must get a change number in its transaction
 * (sync.md section 1). `column` holds the id under which the entity travels.
 */
export async function demandChange(
  db: Kysely<unknown>,
  { table, entity, column }: { table: string; entity: string; column: string },
): Promise<void> {
  await sql`
    create constraint trigger change_number after insert or update or delete on ${sql.table(table)}
      deferrable initially deferred for each row
      execute function demand_change(${sql.lit(entity)}, ${sql.lit(column)});
  `.execute(db)
}
