import { shareVersionSchema } from '@/api-types/agreement';
import { shareVersion } from '@/server/agreement';
import { onlyMethods, writing } from '@/server/endpoint';

export const POST = writing(shareVersionSchema, ({ db, actor, id }, input) =>
  shareVersion(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
