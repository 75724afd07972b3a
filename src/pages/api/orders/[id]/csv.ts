import { z } from 'zod';
import { fetching, onlyMethods } from '@/server/endpoint';
import { openOrderCsv } from '@/server/orders/order-paper';

export const GET = fetching(z.object({}), 'text/csv; charset=utf-8', ({ db, actor, id }) =>
  openOrderCsv(db, actor, id),
);
export const ALL = onlyMethods('GET');
