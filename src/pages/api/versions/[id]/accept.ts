import { acceptVersionSchema } from '@/api-types/agreement';
import { acceptVersion } from '@/server/agreement';
import { onlyMethods, writing } from '@/server/endpoint';

export const POST = writing(acceptVersionSchema, ({ db, actor, id }, input) =>
  acceptVersion(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
