import { photoSizeQuerySchema } from '@/api-types/site';
import { fetching, onlyMethods } from '@/server/endpoint';
import { theFiles } from '@/server/files/the-files';
import { PHOTO_TYPE } from '@/server/site/photo-files';
import { sitePhotoBytes } from '@/server/site/site-photos';

export const GET = fetching(photoSizeQuerySchema, PHOTO_TYPE, async ({ db, actor, id }, { size }) =>
  sitePhotoBytes(db, await theFiles(), actor, id, size),
);
export const ALL = onlyMethods('GET');
