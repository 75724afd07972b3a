import { readFileSync, readdirSync } from 'node:fs';
import { getTableColumns, getTableName, sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import * as schema from '@/db/schema';
import { db, rowsOf, useEmptyDatabase } from './site';

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
  const rows = rowsOf<{ name: string }>(
    await (
      await db()
    ).execute(
      sql`select table_name || '.' || column_name as name from information_schema.columns where table_schema = 'public'`,
    ),
  );
  expect(rows.map(({ name }) => name).sort()).toEqual(expected.sort());
});

test('every row that belongs to a firm says which', async () => {
  const rows = rowsOf<{ name: string }>(
    await (
      await db()
    ).execute(sql`
    select table_name as name from information_schema.tables t where table_schema = 'public'
    and not exists (select 1 from information_schema.columns c
      where c.table_name = t.table_name and c.column_name = 'firm_id')`),
  );
  // A person may be of several firms, a new password is theirs in all of them, and an attempt to sign in is
  // counted before anybody is known.
  expect(rows.map(({ name }) => name).sort()).toEqual([
    'firms',
    'password_resets',
    'people',
    'sign_in_attempts',
  ]);
});

test('what is on record is never altered or deleted, by the database itself', async () => {
  const statements = ['acceptances', 'audit_events'].flatMap((table) => [
    `truncate ${table} cascade`,
    `update ${table} set at = now()`,
    `delete from ${table}`,
  ]);
  const database = await db();
  await database.execute(sql`insert into firms (id, name) values ('f', 'Firm')`);
  await database.execute(
    sql`insert into people (id, email, name, password_hash) values ('p', 'p@firm.example', 'P', '')`,
  );
  await database.execute(
    sql`insert into audit_events (id, firm_id, person_id, what, subject_type, subject_id, detail)
      values ('a', 'f', 'p', 'x', 'x', 'x', '{}')`,
  );
  // Rows of acceptances hang on a version; the statements on all rows are tried where there is one.
  for (const statement of statements.filter(
    (text) => !/^(update|delete).*acceptances/.test(text),
  )) {
    await expect(database.execute(sql.raw(statement)), statement).rejects.toMatchObject({
      cause: { message: expect.stringMatching(/never altered or deleted/) },
    });
  }
});
