import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';

const synced: string[] = [];
vi.mock('node:fs/promises', async (original) => {
  const fs = await original<typeof import('node:fs/promises')>();
  return {
    ...fs,
    open: async (file: string, flags: string) => {
      const handle = await fs.open(file, flags);
      const sync = handle.sync.bind(handle);
      handle.sync = async () => {
        synced.push(file);
        return sync();
      };
      return handle;
    },
  };
});

let dataDir: string;
beforeAll(async () => {
  dataDir = await mkdtemp(path.join(tmpdir(), 'evenlay-sync-'));
});
afterAll(() => rm(dataDir, { recursive: true, force: true }));

it('asks for the folder at opening and closing, and for the log before a change is answered for', async () => {
  const { openDatabase } = await import('@/db/client');
  const opened = await openDatabase({ dataDir });
  const folder = path.join(dataDir, 'pglite');
  expect(synced).toContain(path.join(folder, 'global', 'pg_control'));

  synced.length = 0;
  await opened.db.execute(sql`insert into firms (id, name) values ('f', 'Firm')`);
  const { rows } = (await opened.db.execute(
    sql`select pg_walfile_name(pg_current_wal_lsn()) as segment`,
  )) as unknown as { rows: { segment: string }[] };
  await opened.settled();
  // PostgreSQL itself says which file of the log holds the change.
  expect(synced).toContain(path.join(folder, 'pg_wal', rows[0].segment));

  synced.length = 0;
  await opened.close();
  expect(synced).toContain(path.join(folder, 'global', 'pg_control'));
}, 60_000);
