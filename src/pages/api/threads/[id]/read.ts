import { threadReadSchema } from '@/api-types/comments';
import { onlyMethods, writing } from '@/server/endpoint';
import { markThreadRead } from '@/server/threads';

export const PUT = writing(threadReadSchema, ({ db, actor, id }, input) =>
  markThreadRead(db, actor, id, input),
);
export const ALL = onlyMethods('PUT');
