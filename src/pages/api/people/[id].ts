import { memberChangeSchema } from '@/api-types/members';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeMember, removeMember } from '@/server/members';

export const PATCH = writing(memberChangeSchema, ({ db, actor, id }, change) =>
  changeMember(db, actor, id, change),
);
export const DELETE = reading(({ db, actor, id }) => removeMember(db, actor, id));
export const ALL = onlyMethods('PATCH', 'DELETE');
