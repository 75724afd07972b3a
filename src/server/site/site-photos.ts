import { createHash } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { photoQuerySchema, PhotoSize, SitePhoto } from '@/api-types/site';
import { siteEntries, sitePhotos } from '@/db/schema';
import type { Db } from '../database';
import type { FileStore } from '../files/file-store';
import { done, invalid, notFound, type Outcome } from '../outcomes';
import type { Actor } from '../permissions';
import { encodePhoto } from './photo-encoding';
import { PHOTO_TYPE, photoFile } from './photo-files';
import { putEntry, refuseUnlessMadeBy } from './site-entries';
import { siteVersion } from './site-version';

const hashOf = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

const photoRow = async (db: Db, firmId: string, entryId: string) =>
  (
    await db
      .select()
      .from(sitePhotos)
      .where(and(eq(sitePhotos.firmId, firmId), eq(sitePhotos.entryId, entryId)))
  )[0];

const takenId = () =>
  invalid('This photo was kept before as another entry. Take it again.', [
    { path: ['id'], message: 'is the id of another entry' },
  ]);

/**
 * Keeps a photo and its entry, once. The files are kept first, so that a photo that is known has its files; those of one
 * that came to nothing are found again when it is sent again.
 */
export const keepSitePhoto = async (
  db: Db,
  files: FileStore,
  actor: Actor,
  versionId: string,
  query: z.output<typeof photoQuerySchema>,
  bytes: Uint8Array,
): Promise<Outcome<SitePhoto>> => {
  const site = await siteVersion(db, actor, versionId);
  if (!site.ok) return site;
  const refusal = refuseUnlessMadeBy(actor, query.by);
  if (refusal) return refusal;
  const { id, place, madeAt, device, caption } = query;
  const entry = { id, place, madeAt, content: { kind: 'photo', caption } as const };
  const before = await photoRow(db, actor.firmId, id);
  if (!before) {
    const encoded = await encodePhoto(bytes);
    if (!encoded.ok) return invalid(encoded.why, [{ path: [], message: encoded.why }]);
    const { width, height, full, phone } = encoded.photo;
    const [fullHash, phoneHash] = [hashOf(full), hashOf(phone)];
    await files.put(photoFile(actor.firmId, fullHash), full, PHOTO_TYPE);
    await files.put(photoFile(actor.firmId, phoneHash), phone, PHOTO_TYPE);
    const put = await db.transaction(async (tx) => {
      const how = await putEntry(tx, actor, versionId, device, entry);
      if (how === 'new') {
        await tx
          .insert(sitePhotos)
          .values({ firmId: actor.firmId, entryId: id, width, height, fullHash, phoneHash });
      }
      return how;
    });
    if (put === 'taken') return takenId();
  }
  const kept = await photoRow(db, actor.firmId, id);
  if (!kept) return takenId();
  const [own] = await db
    .select({ versionId: siteEntries.versionId, personId: siteEntries.personId })
    .from(siteEntries)
    .where(and(eq(siteEntries.firmId, actor.firmId), eq(siteEntries.id, id)));
  if (own.versionId !== versionId || own.personId !== actor.personId) return takenId();
  return done({ id, width: kept.width, height: kept.height });
};

/** The bytes of a photo, for those who may enter on its version. */
export const sitePhotoBytes = async (
  db: Db,
  files: FileStore,
  actor: Actor,
  id: string,
  size: PhotoSize,
): Promise<Outcome<Uint8Array>> => {
  const [row] = await db
    .select({ photo: sitePhotos, versionId: siteEntries.versionId })
    .from(sitePhotos)
    .innerJoin(
      siteEntries,
      and(eq(siteEntries.firmId, sitePhotos.firmId), eq(siteEntries.id, sitePhotos.entryId)),
    )
    .where(and(eq(sitePhotos.firmId, actor.firmId), eq(sitePhotos.entryId, id)));
  if (!row) return notFound('photo');
  const site = await siteVersion(db, actor, row.versionId);
  // What may not be seen is not told apart from what is not there.
  if (!site.ok) return notFound('photo');
  const { fullHash, phoneHash } = row.photo;
  const bytes = await files.get(photoFile(actor.firmId, size === 'full' ? fullHash : phoneHash));
  return bytes ? done(bytes) : notFound('photo');
};
