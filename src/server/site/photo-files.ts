import { asc, eq } from 'drizzle-orm';
import { sitePhotos } from '@/db/schema';
import type { Db } from '../database';

/** Every photo is kept as this, whatever it came as. */
export const PHOTO_TYPE = 'image/jpeg';

/** The name of a photo's file, by the SHA-256 of its bytes: a file is never altered, only joined by another. */
export const photoFile = (firmId: string, hash: string): string =>
  `firms/${firmId}/photos/${hash}.jpg`;

/** The hashes of all files of a firm's photos, each once, in order. */
export const photoHashes = async (db: Db, firmId: string): Promise<string[]> => {
  const rows = await db
    .select({ full: sitePhotos.fullHash, phone: sitePhotos.phoneHash })
    .from(sitePhotos)
    .where(eq(sitePhotos.firmId, firmId))
    .orderBy(asc(sitePhotos.entryId));
  return [...new Set(rows.flatMap(({ full, phone }) => [full, phone]))].sort();
};
