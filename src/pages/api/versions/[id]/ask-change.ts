import { askChangeSchema } from '@/api-types/agreement';
import { askForChange } from '@/server/agreement';
import { onlyMethods, writing } from '@/server/endpoint';

export const POST = writing(askChangeSchema, ({ db, actor, id }, input) =>
  askForChange(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
