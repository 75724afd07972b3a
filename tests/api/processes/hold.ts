import { closeDatabase, theDatabase } from '@/server/database';

/** Opens the database that the environment names and keeps it open until told to stop. */
try {
  await theDatabase();
  process.stdout.write('open\n');
  setInterval(() => {}, 1000);
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  await closeDatabase();
  process.exit(1);
}
