import { openDatabase } from '@/db/client';
import { seedIfEmpty } from '@/server/demo';
import { environment } from '@/server/environment';
import { demoSignIns, endWith } from './welcome';

/** Puts the demo firm into an empty database, without serving. */
const seed = async (): Promise<void> => {
  const opened = await openDatabase(environment());
  try {
    const seeded = await seedIfEmpty(opened.db);
    console.log(seeded ? demoSignIns() : 'There are firms in the database; nothing was added.');
  } finally {
    await opened.close();
  }
};

seed().catch(endWith);
