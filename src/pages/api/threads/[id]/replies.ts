import { newReplySchema } from '@/api-types/comments';
import { onlyMethods, writing } from '@/server/endpoint';
import { reply } from '@/server/threads';

export const POST = writing(
  newReplySchema,
  ({ db, actor, id }, input) => reply(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('POST');
