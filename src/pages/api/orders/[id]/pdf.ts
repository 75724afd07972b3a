import { z } from 'zod';
import { fetching, onlyMethods } from '@/server/endpoint';
import { openOrderPdf } from '@/server/orders/order-paper';

export const GET = fetching(z.object({}), 'application/pdf', ({ db, actor, id }) =>
  openOrderPdf(db, actor, id),
);
export const ALL = onlyMethods('GET');
