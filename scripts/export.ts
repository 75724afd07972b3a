import { asc } from 'drizzle-orm';
import { firms } from '@/db/schema';
import { exportFirmTo } from '@/server/archive/firm-archive';
import { openDatabase } from '@/db/client';
import { environment } from '@/server/environment';
import { endWith } from './welcome';

/** `npm run export -- file.zip [firm]`: everything of a firm as one archive. Without a firm's id, of the only one there is. */
const run = async (): Promise<void> => {
  const [file, asked] = process.argv.slice(2);
  if (!file) throw new Error('Say where to: npm run export -- file.zip [firm]');
  const opened = await openDatabase(environment());
  try {
    const all = await opened.db
      .select({ id: firms.id, name: firms.name })
      .from(firms)
      .orderBy(asc(firms.name));
    const listed = all.map(({ id, name }) => `  ${id}  ${name}`).join('\n');
    const firm = asked ? all.find(({ id }) => id === asked) : all.length === 1 ? all[0] : undefined;
    if (!firm) {
      throw new Error(
        all.length === 0 ? 'There is no firm to export.' : `Say which firm to export:\n${listed}`,
      );
    }
    await exportFirmTo(opened.db, firm.id, file);
    console.log(`${firm.name} is in ${file}.`);
  } finally {
    await opened.close();
  }
};

run().catch(endWith);
