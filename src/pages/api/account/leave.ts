import { onlyMethods, reading } from '@/server/endpoint';
import { removeMember } from '@/server/members';

export const POST = reading(({ db, actor }) => removeMember(db, actor, actor.personId));
export const ALL = onlyMethods('POST');
