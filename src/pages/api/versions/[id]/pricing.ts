import { onlyMethods, reading } from '@/server/endpoint';
import { openVersionPricing } from '@/server/pricing/version-pricing';

export const GET = reading(({ db, actor, id }) => openVersionPricing(db, actor, id));
export const ALL = onlyMethods('GET');
