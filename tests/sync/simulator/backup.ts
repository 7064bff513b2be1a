// A backup of both shops and its restoring, as a real one would do it: everything since is gone, and the
// epoch is another one. Sessions, phones and roles go back as well.
import { randomUUID } from 'node:crypto'
import type pg from 'pg'

export type Backup = { tables: { name: string; columns: string; rows: string }[] }

/** What the two shops' tables hold now. Runs as the superuser. */
export async function takeBackup(admin: pg.Client, shopIds: readonly string[]): Promise<Backup> {
  const tables: Backup['tables'] = []
  for (const { name, columns } of await tablesOf(admin)) {
    const { rows } = await admin.query<{ rows: string }>(
      `select coalesce(json_agg(t), '[]')::text as rows
       from (select ${columns} from public.${name} where shop_id = any($1)) t`,
      [shopIds],
    )
    tables.push({ name, columns, rows: rows[0]?.rows ?? '[]' })
  }
  return { tables }
}

/** Puts the tables back and gives the shops another epoch, as docs/spec/data.md asks. */
export async function restore(
  admin: pg.Client,
  shopIds: readonly string[],
  backup: Backup,
): Promise<void> {
  await admin.query('begin')
  await admin.query('set local session_replication_role = replica')
  for (const { name, columns, rows } of backup.tables) {
    await admin.query(`delete from public.${name} where shop_id = any($1)`, [shopIds])
    await admin.query(
      `insert into public.${name} (${columns})
       select ${columns} from json_populate_recordset(null::public.${name}, $1::json)`,
      [rows],
    )
  }
  await admin.query('update shop_counter set epoch = $2 where shop_id = any($1)', [
    shopIds,
    randomUUID(),
  ])
  await admin.query('commit')
}

/** Every table of a shop with the columns that can be written. */
async function tablesOf(admin: pg.Client): Promise<{ name: string; columns: string }[]> {
  const { rows } = await admin.query<{ name: string; columns: string }>(`
    select c.table_name as name,
      string_agg(quote_ident(c.column_name), ', ' order by c.ordinal_position) as columns
    from information_schema.columns c
      join information_schema.tables t using (table_schema, table_name)
    where c.table_schema = 'public' and t.table_type = 'BASE TABLE' and c.is_generated = 'NEVER'
    group by c.table_name
    having bool_or(c.column_name = 'shop_id')
    order by c.table_name`)
  return rows
}
