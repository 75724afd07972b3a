import { onlyMethods, reading } from '@/server/endpoint';
import { inviteAgain } from '@/server/invitations';

export const POST = reading(({ db, actor, id }) => inviteAgain(db, actor, id));
export const ALL = onlyMethods('POST');
