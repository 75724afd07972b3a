import { onlyMethods, reading } from '@/server/endpoint';
import { layoutThreads } from '@/server/threads';

export const GET = reading(({ db, actor, id }) => layoutThreads(db, actor, id));
export const ALL = onlyMethods('GET');
