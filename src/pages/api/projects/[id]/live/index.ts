import { onlyMethods, reading } from '@/server/endpoint';
import { liveState } from '@/server/live';

export const GET = reading(({ db, actor, id }) => liveState(db, actor, id));
export const ALL = onlyMethods('GET');
