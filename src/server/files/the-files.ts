import path from 'node:path';
import { endBeforeClosing } from '../database';
import { environment, type Environment } from '../environment';
import type { FileStore } from './file-store';
import { startLocalS3 } from './local-s3';
import { s3Store } from './s3-store';

/** One for the process, on globalThis: the start script, the built server and reloaded modules share it. */
const place = globalThis as typeof globalThis & { evenlayFiles?: Promise<FileStore> };

const opened = async ({ s3, dataDir }: Pick<Environment, 's3' | 'dataDir'>): Promise<FileStore> => {
  if (s3) return s3Store(s3);
  const local = await startLocalS3(path.resolve(dataDir, 'files'));
  endBeforeClosing(local.close);
  return s3Store(local.settings);
};

/** Where this process keeps files: the bucket of the settings, or a service of its own on a folder of DATA_DIR. */
export const theFiles = (): Promise<FileStore> =>
  (place.evenlayFiles ??= opened(environment()).catch((error: unknown) => {
    delete place.evenlayFiles;
    throw error;
  }));

/** Puts a store in the place of the process's own, for tests. */
export const useFiles = (files: FileStore): void => {
  place.evenlayFiles = Promise.resolve(files);
};
