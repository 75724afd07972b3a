import { onlyMethods, reading } from '@/server/endpoint';
import { openVersionCost } from '@/server/pricing/version-cost';

export const GET = reading(({ db, actor, id }) => openVersionCost(db, actor, id));
export const ALL = onlyMethods('GET');
