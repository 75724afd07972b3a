import { draftFromVersionSchema } from '@/api-types/layouts';
import { draftFromVersion } from '@/server/drafts';
import { onlyMethods, writing } from '@/server/endpoint';

export const POST = writing(draftFromVersionSchema, ({ db, actor, id }, input) =>
  draftFromVersion(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
