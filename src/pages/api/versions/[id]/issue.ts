import { issueVersionSchema } from '@/api-types/agreement';
import { issueVersion } from '@/server/agreement';
import { onlyMethods, writing } from '@/server/endpoint';

export const POST = writing(issueVersionSchema, ({ db, actor, id }, input) =>
  issueVersion(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
