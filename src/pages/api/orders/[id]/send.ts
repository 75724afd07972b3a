import { orderSendSchema } from '@/api-types/purchase-orders';
import { onlyMethods, writing } from '@/server/endpoint';
import { sendOrder } from '@/server/orders/order-sending';

export const POST = writing(orderSendSchema, ({ db, actor, id }, input) =>
  sendOrder(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
