import { duplicateLayoutSchema } from '@/api-types/layouts';
import { onlyMethods, writing } from '@/server/endpoint';
import { duplicateLayout } from '@/server/layout-copies';

export const POST = writing(
  duplicateLayoutSchema,
  ({ db, actor, id }, input) => duplicateLayout(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('POST');
