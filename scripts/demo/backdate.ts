import { sql } from 'drizzle-orm'
import type { Database } from '../../server/utils/db'

/** When a step of the loading really ran, and when in the demo's story it happened. */
export interface LoadedStep { began: Date, ended: Date, at: Date }

const quoted = (name: string) => sql.identifier(name)

/**
 * Moves every instant that the loading wrote to its day in the story. The services stamp the present, as they should;
 * the demo has only just made this database, owns it, and shifts what it wrote itself. The guards of the ledger and of
 * what moved in the drawers are put aside inside this one transaction and are back before anybody reads.
 */
export async function backdate(db: Database, steps: readonly LoadedStep[]): Promise<void> {
  await db.transaction(async (tx) => {
    await tx.execute(sql`create temporary table loaded_steps (began timestamptz primary key, ended timestamptz not null, at timestamptz not null) on commit drop`)
    for (const { began, ended, at } of steps) {
      await tx.execute(sql`insert into loaded_steps values (${began.toISOString()}, ${ended.toISOString()}, ${at.toISOString()})`)
    }
    const { rows } = await tx.execute<{ table: string, column: string }>(sql`
      select c.table_name as "table", c.column_name as "column" from information_schema.columns c
      join information_schema.tables t using (table_schema, table_name)
      where c.table_schema = 'public' and t.table_type = 'BASE TABLE' and c.data_type = 'timestamp with time zone'
        and c.table_name not in ('sessions', 'idempotency_keys')`)
    await tx.execute(sql`alter table ledger disable trigger ledger_append_only`)
    await tx.execute(sql`alter table lot_movements disable trigger lot_movements_append_only`)
    for (const { table, column } of rows) {
      await tx.execute(sql`update ${quoted(table)} as row set ${quoted(column)} = step.at + (row.${quoted(column)} - step.began)
        from loaded_steps step where row.${quoted(column)} between step.began and step.ended`)
    }
    await tx.execute(sql`alter table ledger enable trigger ledger_append_only`)
    await tx.execute(sql`alter table lot_movements enable trigger lot_movements_append_only`)
  })
}
