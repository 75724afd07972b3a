import { newOrdersSchema } from '@/api-types/purchase-orders';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { beginOrders, listOrders } from '@/server/orders/orders';

export const GET = reading(({ db, actor, id }) => listOrders(db, actor, id));
export const POST = writing(
  newOrdersSchema,
  ({ db, actor, id }, input) => beginOrders(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
