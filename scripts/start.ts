import { createServer, type RequestListener } from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { closeDatabase, endBeforeClosing, theDatabase } from '@/server/database';
import { demoIsThere, seedIfEmpty } from '@/server/demo';
import { environment } from '@/server/environment';
import { startPosting } from '@/server/mail/posting';
import { noteOrigin } from '@/server/site-origin';
import { buildIfStale } from './build';
import { endWithNpm } from './parent';
import { demoSignIns, endWith, whereLettersGo } from './welcome';

/** How long answers under way may take to end when the server is told to stop, ms. */
const PATIENCE = 5000;

/** `npm start`: builds if needed, makes and seeds the database if it is empty, and serves. */
const start = async (): Promise<void> => {
  process.env.NODE_ENV ??= 'production';
  endWithNpm();
  const { host, port } = environment();
  await buildIfStale();
  const { db } = await theDatabase();
  if (await seedIfEmpty(db)) console.log('The database was empty; the demo firm is in it now.');

  process.env.ASTRO_NODE_AUTOSTART = 'disabled';
  const entry = path.resolve(import.meta.dirname, '../dist/server/entry.mjs');
  const { handler } = (await import(pathToFileURL(entry).href)) as { handler: RequestListener };
  const server = createServer(handler);
  endBeforeClosing(async () => {
    const ended = new Promise<void>((resolve) => server.close(() => resolve()));
    server.closeIdleConnections();
    await Promise.race([ended, new Promise((resolve) => setTimeout(resolve, PATIENCE))]);
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, resolve);
  }).catch(async (error: NodeJS.ErrnoException) => {
    await closeDatabase();
    throw error.code === 'EADDRINUSE'
      ? new Error(`Port ${port} is taken. Set PORT to another, or to 0 for any free one.`)
      : error;
  });

  const { address, port: bound } = server.address() as AddressInfo;
  const shown = ['0.0.0.0', '::', '127.0.0.1', '::1'].includes(address) ? 'localhost' : address;
  const origin = `http://${shown}:${bound}`;
  noteOrigin(origin);
  await startPosting(db, environment());
  console.log(`\n  Evenlay is at ${origin}\n`);
  console.log(`  ${whereLettersGo(environment(), origin)}\n`);
  if (await demoIsThere(db)) console.log(`${demoSignIns()}\n`);
};

start().catch(endWith);
