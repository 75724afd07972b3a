import { getTableColumns, getTableName, sql, type SQL } from 'drizzle-orm';
import type { PgTable } from 'drizzle-orm/pg-core';

/**
 * Puts many rows in as one JSON parameter. A statement of thousands of values takes longer to be put together and
 * bound than to be carried out, and PostgreSQL takes at most 65,535 of them.
 *
 * @param names the columns that are written, by their names in the schema; dates go as ISO 8601 text
 */
export const rowsInserted = <T extends PgTable, N extends keyof T['$inferInsert'] & string>(
  table: T,
  names: readonly N[],
  rows: readonly Readonly<Partial<Record<N, unknown>>>[],
): SQL => {
  const columns = getTableColumns(table);
  const list = sql.join(
    names.map((name) => sql.identifier(columns[name].name)),
    sql`, `,
  );
  const typed = sql.join(
    names.map((name) => sql`${sql.identifier(columns[name].name)} ${sql.raw(columns[name].getSQLType())}`), // prettier-ignore
    sql`, `,
  );
  const json = JSON.stringify(
    rows.map((row) => Object.fromEntries(names.map((name) => [columns[name].name, row[name] ?? null]))), // prettier-ignore
  );
  return sql`insert into ${sql.identifier(getTableName(table))} (${list})
    select ${list} from json_to_recordset(${json}::text::json) as given (${typed})`;
};
