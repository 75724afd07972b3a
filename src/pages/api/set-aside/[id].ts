import { onlyMethods, reading } from '@/server/endpoint';
import { openSetAside } from '@/server/set-aside';

export const GET = reading(({ db, actor, id }) => openSetAside(db, actor, id));
export const ALL = onlyMethods('GET');
