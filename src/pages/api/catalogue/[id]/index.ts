import { itemChangeSchema } from '@/api-types/catalogue';
import { changeItem, openItem, removeItem } from '@/server/catalogue/items';
import { onlyMethods, reading, writing } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => openItem(db, actor, id));
export const PATCH = writing(itemChangeSchema, ({ db, actor, id }, change) =>
  changeItem(db, actor, id, change),
);
export const DELETE = reading(({ db, actor, id }) => removeItem(db, actor, id));
export const ALL = onlyMethods('GET', 'PATCH', 'DELETE');
