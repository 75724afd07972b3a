import { importFirm } from '@/server/archive/import';
import { openDatabase } from '@/db/client';
import { withFile } from '@/server/archive/zip-file';
import { environment } from '@/server/environment';
import { endWith } from './welcome';

/** `npm run import -- file.zip`: puts a firm's archive into a database that holds no firm yet. */
const run = async (): Promise<void> => {
  const [file] = process.argv.slice(2);
  if (!file) throw new Error('Say which archive: npm run import -- file.zip');
  const opened = await openDatabase(environment());
  try {
    const imported = await withFile(file, (archive) => importFirm(opened.db, archive));
    if (!imported.ok) throw new Error(imported.detail);
    const { counts } = imported.value;
    console.log(
      `Put in ${counts.projects} projects, ${counts.layouts} layouts and ${counts.versions} versions. ` +
        'Passwords are not in an archive: everybody chooses a new one.',
    );
  } finally {
    await opened.close();
  }
};

run().catch(endWith);
