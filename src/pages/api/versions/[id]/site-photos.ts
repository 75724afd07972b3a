import { photoQuerySchema } from '@/api-types/site';
import { PHOTO_LIMIT } from '@/api-types/site-limits';
import { onlyMethods, receiving } from '@/server/endpoint';
import { theFiles } from '@/server/files/the-files';
import { keepSitePhoto } from '@/server/site/site-photos';

const limit = {
  bytes: PHOTO_LIMIT,
  words: 'This photo is over 12 MB. Take it again at a smaller size.',
};

export const POST = receiving(photoQuerySchema, limit, async ({ db, actor, id }, query, bytes) =>
  keepSitePhoto(db, await theFiles(), actor, id, query, bytes),
);
export const ALL = onlyMethods('POST');
