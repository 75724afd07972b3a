import { onlyMethods, reading } from '@/server/endpoint';
import { withdrawInvitation } from '@/server/invitations';

export const DELETE = reading(({ db, actor, id }) => withdrawInvitation(db, actor, id));
export const ALL = onlyMethods('DELETE');
