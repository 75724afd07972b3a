import path from 'node:path';
import { PGlite } from '@electric-sql/pglite';
import { drizzle as drizzlePglite } from 'drizzle-orm/pglite';
import { migrate as migratePglite } from 'drizzle-orm/pglite/migrator';
import type { PgDatabase, PgQueryResultHKT } from 'drizzle-orm/pg-core';
import { drizzle as drizzlePostgres } from 'drizzle-orm/postgres-js';
import { migrate as migratePostgres } from 'drizzle-orm/postgres-js/migrator';
import postgres from 'postgres';
import { holdFolder } from './folder-lock';
import { folderSynced, logSynced } from './folder-sync';
import { migrationsFolder } from './migrations-folder';
import * as schema from './schema';

/** The database, or a transaction on it: the same queries run on PGlite and on PostgreSQL. */
export type Db = PgDatabase<PgQueryResultHKT, typeof schema>;

export interface OpenDatabase {
  readonly db: Db;
  readonly kind: 'pglite' | 'postgres';
  /** Resolves once everything committed so far is on the disk; asked before a change is answered for. */
  readonly settled: () => Promise<void>;
  /** Finishes what is running, writes everything out and lets go of the folder or the connections. */
  readonly close: () => Promise<void>;
}

export interface DatabaseChoice {
  /** Address of a PostgreSQL server; without one PGlite keeps its files in `dataDir`/pglite. */
  readonly databaseUrl?: string | undefined;
  readonly dataDir: string;
}

/** Any number that nothing else in the database uses as an advisory lock. */
const MIGRATION_LOCK = 5_170_221;

const openPostgres = async (url: string): Promise<OpenDatabase> => {
  // Several servers may start at once on one database: one migrates, the others wait for it.
  const one = postgres(url, { max: 1, onnotice: () => {} });
  try {
    await one`select pg_advisory_lock(${MIGRATION_LOCK})`;
    await migratePostgres(drizzlePostgres(one), { migrationsFolder: migrationsFolder() });
  } finally {
    await one.end();
  }
  const client = postgres(url, { onnotice: () => {} });
  const db = drizzlePostgres(client, { schema }) as unknown as Db;
  // PostgreSQL has a commit on its disk before it answers.
  return { db, kind: 'postgres', settled: async () => {}, close: () => client.end({ timeout: 5 }) };
};

/** Migrates a PGlite that is already open, such as one in memory for a test. */
export const openPglite = async (
  client: PGlite,
  letGo: () => Promise<void> = async () => {},
  settled: () => Promise<void> = async () => {},
): Promise<OpenDatabase> => {
  const db = drizzlePglite(client, { schema });
  await migratePglite(db, { migrationsFolder: migrationsFolder() });
  let closing: Promise<void> | null = null;
  const close = () => (closing ??= client.close().finally(letGo));
  return { db: db as unknown as Db, kind: 'pglite', settled, close };
};

const openFolder = async (dataDir: string): Promise<OpenDatabase> => {
  const folder = path.resolve(dataDir, 'pglite');
  const letGo = await holdFolder(folder);
  try {
    // Never relaxed: an answer leaves only after PGlite has handed the commit to the file system.
    const client = await PGlite.create(folder, { relaxedDurability: false });
    const opened = await openPglite(
      client,
      () => folderSynced(folder).finally(letGo),
      () => logSynced(folder),
    );
    await folderSynced(folder);
    return opened;
  } catch (error) {
    await letGo();
    throw error;
  }
};

/**
 * Opens the database and applies the migrations that it has not had.
 *
 * @throws FolderInUse when another process has the PGlite folder open
 */
export const openDatabase = (choice: DatabaseChoice): Promise<OpenDatabase> =>
  choice.databaseUrl ? openPostgres(choice.databaseUrl) : openFolder(choice.dataDir);
