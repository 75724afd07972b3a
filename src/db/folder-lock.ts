import { createHash } from 'node:crypto';
import { mkdir, open, readFile, realpath, rm, writeFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import path from 'node:path';

/** Another process has the database folder open. */
export class FolderInUse extends Error {
  override name = 'FolderInUse';
}

const holderOf = async (file: string): Promise<number | null> => {
  const pid = Number.parseInt(await readFile(file, 'utf8').catch(() => ''), 10);
  return Number.isInteger(pid) && pid > 0 ? pid : null;
};

const refusal = (folder: string, holder: number | null): FolderInUse =>
  new FolderInUse(
    `The database in ${folder} is in use by another process${holder === null ? '' : ` (${holder})`}. ` +
      'Only one process may open it at a time: stop the other one, give this one another ' +
      'DATA_DIR, or use a PostgreSQL server through DATABASE_URL.',
  );

const isAlive = (pid: number): boolean => {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
};

/** An abstract socket is let go by the kernel however the process ends, even by SIGKILL. */
const holdSocket = async (folder: string, file: string): Promise<() => Promise<void>> => {
  const server = createServer();
  const name = `\0evenlay-${createHash('sha1').update(folder).digest('hex')}`;
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen({ path: name }, resolve);
  }).catch(async (error: NodeJS.ErrnoException) => {
    throw error.code === 'EADDRINUSE' ? refusal(folder, await holderOf(file)) : error;
  });
  server.unref();
  await writeFile(file, `${process.pid}\n`);
  return async () => {
    await rm(file, { force: true });
    await new Promise<void>((resolve) => server.close(() => resolve()));
  };
};

/** Without abstract sockets: a file made only if it is absent; one left by a dead process is taken over. */
const holdFile = async (folder: string, file: string): Promise<() => Promise<void>> => {
  for (let attempt = 0; attempt < 2; attempt += 1) {
    try {
      const handle = await open(file, 'wx');
      await handle.writeFile(`${process.pid}\n`);
      await handle.close();
      return () => rm(file, { force: true });
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
      const holder = await holderOf(file);
      if (holder === null || isAlive(holder)) throw refusal(folder, holder);
      await rm(file, { force: true });
    }
  }
  throw refusal(folder, await holderOf(file));
};

/**
 * Holds a PGlite folder for this process, since PGlite itself lets two processes open one folder
 * and then loses what one of them wrote. The lock file beside the folder tells who holds it.
 *
 * @param folder the folder of the database; its parent is made if missing
 * @param means `socket` where the system has abstract sockets (Linux), `file` elsewhere
 * @returns what lets go of it
 * @throws FolderInUse when another process holds it
 */
export const holdFolder = async (
  folder: string,
  means: 'socket' | 'file' = process.platform === 'linux' ? 'socket' : 'file',
): Promise<() => Promise<void>> => {
  await mkdir(path.dirname(folder), { recursive: true });
  const real = path.join(await realpath(path.dirname(folder)), path.basename(folder));
  const file = `${real}.lock`;
  return means === 'socket' ? holdSocket(real, file) : holdFile(real, file);
};
