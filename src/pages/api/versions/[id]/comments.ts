import { newCommentSchema } from '@/api-types/comments';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { comment, versionThreads } from '@/server/threads';

export const GET = reading(({ db, actor, id }) => versionThreads(db, actor, id));
export const POST = writing(
  newCommentSchema,
  ({ db, actor, id }, input) => comment(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
