import { onlyMethods, reading } from '@/server/endpoint';
import { openSitePack } from '@/server/site/site-packs';

export const GET = reading(({ db, actor, id }) => openSitePack(db, actor, id));
export const ALL = onlyMethods('GET');
