import type { Db, OpenDatabase } from '@/db/client';
import { openDatabase } from '@/db/client';
import { environment } from './environment';

export type { Db } from '@/db/client';

/** One for the process, on globalThis: the start script, the built server and reloaded modules share it. */
const place = globalThis as typeof globalThis & { evenlayDatabase?: Promise<OpenDatabase> };

/** The open database; opened, and its migrations applied, at the first call. */
export const theDatabase = (): Promise<OpenDatabase> => {
  place.evenlayDatabase ??= openAndCloseOnSignal().catch((error: unknown) => {
    delete place.evenlayDatabase;
    throw error;
  });
  return place.evenlayDatabase;
};

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

/** Exit codes by custom: 128 and the signal's number. */
const SIGNALS = { SIGINT: 130, SIGTERM: 143 } as const;

const openAndCloseOnSignal = async (): Promise<OpenDatabase> => {
  const opened = await openDatabase(environment());
  for (const [signal, code] of Object.entries(SIGNALS)) {
    process.once(signal, () => {
      void opened.close().finally(() => process.exit(code));
    });
  }
  return opened;
};
