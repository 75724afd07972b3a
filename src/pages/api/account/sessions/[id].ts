import { onlyMethods, reading } from '@/server/endpoint';
import { endOwnSession } from '@/server/own-sessions';

export const DELETE = reading(({ db, actor, id }) => endOwnSession(db, actor.personId, id));
export const ALL = onlyMethods('DELETE');
