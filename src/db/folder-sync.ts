import { open, readdir, stat } from 'node:fs/promises';
import path from 'node:path';

/**
 * PGlite hands its writes to the operating system and does not ask for them to reach the disk: a killed
 * process loses nothing, a power cut could lose what was answered for. These ask.
 *
 * PGlite checkpoints only when it is closed, so everything since it was opened can be had again from the
 * write-ahead log, which holds whole pages: with the folder on the disk at opening and the log on the
 * disk at each answer, a power cut loses nothing that was answered for.
 */

const fileSynced = async (file: string): Promise<void> => {
  const handle = await open(file, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
};

/** A folder's own entries; Windows keeps them without being asked, and does not open folders. */
const entriesSynced = async (folder: string): Promise<void> => {
  if (process.platform !== 'win32') await fileSynced(folder);
};

/** Puts every file below the folder on the disk, and the folders themselves. */
export const folderSynced = async (folder: string): Promise<void> => {
  for (const entry of await readdir(folder, { withFileTypes: true })) {
    const at = path.join(folder, entry.name);
    if (entry.isDirectory()) await folderSynced(at);
    else if (entry.isFile()) await fileSynced(at);
  }
  await entriesSynced(folder);
};

/** Segments written to within this before the newest may still be on their way, ms. */
const SEGMENT_SPAN_MS = 60_000;

/** Puts the newest part of the write-ahead log on the disk. */
export const logSynced = async (folder: string): Promise<void> => {
  const log = path.join(folder, 'pg_wal');
  const segments = await Promise.all(
    (await readdir(log, { withFileTypes: true }))
      .filter((entry) => entry.isFile())
      .map(async ({ name }) => {
        const file = path.join(log, name);
        return { file, at: (await stat(file)).mtimeMs };
      }),
  );
  const newest = Math.max(...segments.map(({ at }) => at));
  for (const { file, at } of segments) if (at >= newest - SEGMENT_SPAN_MS) await fileSynced(file);
  await entriesSynced(log);
};
