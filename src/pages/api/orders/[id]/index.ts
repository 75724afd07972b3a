import { orderChangeSchema } from '@/api-types/purchase-orders';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeOrder, dropOrder, openOrder } from '@/server/orders/orders';

export const GET = reading(({ db, actor, id }) => openOrder(db, actor, id));
export const PATCH = writing(orderChangeSchema, ({ db, actor, id }, change) =>
  changeOrder(db, actor, id, change),
);
export const DELETE = reading(({ db, actor, id }) => dropOrder(db, actor, id));
export const ALL = onlyMethods('GET', 'PATCH', 'DELETE');
