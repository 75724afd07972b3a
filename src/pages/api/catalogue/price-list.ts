import { priceListQuerySchema } from '@/api-types/catalogue';
import { openPriceList } from '@/server/catalogue/price-list';
import { asking, onlyMethods } from '@/server/endpoint';

export const GET = asking(priceListQuerySchema, ({ db, actor }, { on }) =>
  openPriceList(db, actor, on),
);
export const ALL = onlyMethods('GET');
