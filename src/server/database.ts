import type { Db, OpenDatabase } from '@/db/client';
import { openDatabase } from '@/db/client';
import { environment } from './environment';

export type { Db } from '@/db/client';

/** One for the process, on globalThis: the start script, the built server and reloaded modules share it. */
const place = globalThis as typeof globalThis & {
  evenlayDatabase?: Promise<OpenDatabase>;
  evenlayEndings?: (() => Promise<void>)[];
};

/** The open database; opened, and its migrations applied, at the first call. */
export const theDatabase = (): Promise<OpenDatabase> => {
  place.evenlayDatabase ??= openAndCloseOnSignal().catch((error: unknown) => {
    delete place.evenlayDatabase;
    throw error;
  });
  return place.evenlayDatabase;
};

/** The database of this process, opened and migrated at the first call. */
export const database = async (): Promise<Db> => (await theDatabase()).db;

/** Puts a database in the place of the process's own, for tests. */
export const useDatabase = (opened: OpenDatabase): void => {
  place.evenlayDatabase = Promise.resolve(opened);
};

/** Closes the database, if it was opened. */
export const closeDatabase = async (): Promise<void> => {
  const opened = place.evenlayDatabase;
  delete place.evenlayDatabase;
  await (await opened?.catch(() => undefined))?.close();
};

/** What must end before the database closes, such as a server that still answers requests. */
export const endBeforeClosing = (end: () => Promise<void>): void => {
  (place.evenlayEndings ??= []).push(end);
};

const openAndCloseOnSignal = async (): Promise<OpenDatabase> => {
  const opened = await openDatabase(environment());
  const end = async () => {
    await Promise.allSettled((place.evenlayEndings ?? []).map((ending) => ending()));
    await opened.close();
    process.exit(0);
  };
  process.once('SIGTERM', () => void end());
  process.once('SIGINT', () => void end());
  return opened;
};
