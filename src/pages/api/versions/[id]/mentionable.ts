import { onlyMethods, reading } from '@/server/endpoint';
import { mentionable } from '@/server/threads';

export const GET = reading(({ db, actor, id }) => mentionable(db, actor, id));
export const ALL = onlyMethods('GET');
