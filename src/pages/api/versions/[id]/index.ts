import { onlyMethods, reading } from '@/server/endpoint';
import { openVersion } from '@/server/versions';

export const GET = reading(({ db, actor, id }) => openVersion(db, actor, id));
export const ALL = onlyMethods('GET');
