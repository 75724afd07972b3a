import postgres from 'postgres';
import type { TestProject } from 'vitest/node';
import { openDatabase } from '@/db/client';
import { startPostgres } from './server';
import { TEMPLATE } from './template';

declare module 'vitest' {
  interface ProvidedContext {
    /** A PostgreSQL server's address, without the database's name; null where tests run on PGlite. */
    postgres: string | null;
  }
}

/** One PostgreSQL server for all test files of the project, each of which has a database of its own. */
export default async function setup(project: TestProject) {
  const server = await startPostgres();
  const client = postgres(server.urlOf('postgres'), { max: 1, onnotice: () => {} });
  await client.unsafe(`create database ${TEMPLATE}`);
  await client.end();
  const opened = await openDatabase({ databaseUrl: server.urlOf(TEMPLATE), dataDir: '' });
  await opened.close();
  project.provide('postgres', server.urlOf('').replace(/\/$/, ''));
  return server.stop;
}
