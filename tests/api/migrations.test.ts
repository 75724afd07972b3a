import { readFileSync, readdirSync } from 'node:fs';
import { getTableColumns, getTableName, sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import * as schema from '@/db/schema';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

interface Journal {
  readonly entries: readonly {
    readonly idx: number;
    readonly when: number;
    readonly tag: string;
  }[];
}

const journal = JSON.parse(readFileSync('drizzle/meta/_journal.json', 'utf8')) as Journal;

test('the migrations of the journal are in order of number and of time', () => {
  // Drizzle applies only migrations later than the last applied: one that is older would be skipped unseen.
  journal.entries.forEach((entry, n) => {
    expect(entry.idx).toBe(n);
    if (n > 0) expect(entry.when).toBeGreaterThan(journal.entries[n - 1].when);
  });
});

test('every migration is in the journal', () => {
  const files = readdirSync('drizzle').filter((name) => name.endsWith('.sql'));
  expect(files.sort()).toEqual(journal.entries.map(({ tag }) => `${tag}.sql`));
});

test('the migrations make the columns of the schema, so that none waits to be generated', async () => {
  const expected = Object.values(schema).flatMap((table) =>
    Object.values(getTableColumns(table)).map((column) => `${getTableName(table)}.${column.name}`),
  );
  const result = (await (
    await db()
  ).execute(
    sql`select table_name || '.' || column_name as name from information_schema.columns where table_schema = 'public'`,
  )) as unknown as { rows: { name: string }[] };
  expect(result.rows.map(({ name }) => name).sort()).toEqual(expected.sort());
});

test('every row that belongs to a firm says which', async () => {
  const result = (await (
    await db()
  ).execute(sql`
    select table_name as name from information_schema.tables t where table_schema = 'public'
    and not exists (select 1 from information_schema.columns c
      where c.table_name = t.table_name and c.column_name = 'firm_id')`)) as unknown as {
    rows: { name: string }[];
  };
  // A person may be of several firms, and an attempt to sign in is counted before anybody is known.
  expect(result.rows.map(({ name }) => name).sort()).toEqual([
    'firms',
    'people',
    'sign_in_attempts',
  ]);
});
