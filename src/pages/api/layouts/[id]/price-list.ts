import { layoutPriceSchema } from '@/api-types/layout-prices';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { openLayoutPriceList, setLayoutPrice } from '@/server/pricing/layout-prices';

export const GET = reading(({ db, actor, id }) => openLayoutPriceList(db, actor, id));
export const PUT = writing(layoutPriceSchema, ({ db, actor, id }, input) =>
  setLayoutPrice(db, actor, id, input),
);
export const ALL = onlyMethods('GET', 'PUT');
