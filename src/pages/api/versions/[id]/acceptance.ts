import { openAcceptance } from '@/server/agreement';
import { onlyMethods, reading } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => openAcceptance(db, actor, id));
export const ALL = onlyMethods('GET');
