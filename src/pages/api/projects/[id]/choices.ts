import { choicesSchema } from '@/api-types/choices';
import { clientChoices, pickChoices, unpickChoices } from '@/server/choices';
import { onlyMethods, reading, writing } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => clientChoices(db, actor, id));
export const PUT = writing(choicesSchema, ({ db, actor, id }, picked) =>
  pickChoices(db, actor, id, picked),
);
export const DELETE = reading(({ db, actor, id }) => unpickChoices(db, actor, id));
export const ALL = onlyMethods('GET', 'PUT', 'DELETE');
