import { spawn } from 'node:child_process';
import path from 'node:path';
import { openDatabase } from '@/db/client';
import { seedIfEmpty } from '@/server/demo';
import { environment } from '@/server/environment';
import { endWithNpm } from './parent';
import { demoSignIns, endWith } from './welcome';

/** `npm run dev`: seeds the database if it is empty, lets go of it, and starts Astro's development server. */
const develop = async (): Promise<void> => {
  endWithNpm();
  const settings = environment();
  const opened = await openDatabase(settings);
  try {
    await seedIfEmpty(opened.db);
  } finally {
    await opened.close();
  }
  console.log(`\n${demoSignIns()}\n`);
  const astro = path.resolve(import.meta.dirname, '../node_modules/astro/astro.js');
  const where = ['--host', settings.host, '--port', String(settings.port)];
  const child = spawn(process.execPath, [astro, 'dev', ...where, ...process.argv.slice(2)], {
    cwd: path.resolve(import.meta.dirname, '..'),
    stdio: 'inherit',
  });
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => child.kill(signal));
  child.once('exit', (code) => process.exit(code ?? 0));
};

develop().catch(endWith);
