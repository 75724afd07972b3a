import { newLayoutSchema } from '@/api-types/layouts';
import { onlyMethods, writing } from '@/server/endpoint';
import { createLayout } from '@/server/layouts';

export const POST = writing(
  newLayoutSchema,
  ({ db, actor, id }, input) => createLayout(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('POST');
