import { threadChangeSchema } from '@/api-types/comments';
import { onlyMethods, writing } from '@/server/endpoint';
import { changeThread } from '@/server/threads';

export const PATCH = writing(threadChangeSchema, ({ db, actor, id }, input) =>
  changeThread(db, actor, id, input),
);
export const ALL = onlyMethods('PATCH');
