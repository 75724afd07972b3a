import { catalogueQuerySchema, newItemSchema } from '@/api-types/catalogue';
import { cataloguePage } from '@/server/catalogue/item-list';
import { addItem } from '@/server/catalogue/items';
import { asking, onlyMethods, writing } from '@/server/endpoint';

export const GET = asking(catalogueQuerySchema, ({ db, actor }, query) =>
  cataloguePage(db, actor, query),
);
export const POST = writing(
  newItemSchema,
  ({ db, actor }, input) => addItem(db, actor, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
