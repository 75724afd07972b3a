import { presenceSchema } from '@/api-types/live';
import { onlyMethods, writing } from '@/server/endpoint';
import { beat } from '@/server/presence';

export const PUT = writing(presenceSchema, ({ db, actor, id }, input) =>
  beat(db, actor, id, input),
);
export const ALL = onlyMethods('PUT');
