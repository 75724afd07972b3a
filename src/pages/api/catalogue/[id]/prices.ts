import { priceHistory } from '@/server/catalogue/price-history';
import { onlyMethods, reading } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => priceHistory(db, actor, id));
export const ALL = onlyMethods('GET');
