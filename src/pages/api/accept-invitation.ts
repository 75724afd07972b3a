import { acceptInvitationSchema } from '@/api-types/invitations';
import { onlyMethods } from '@/server/endpoint';
import { entering } from '@/server/entering';
import { acceptInvitation } from '@/server/invitation-acceptance';

export const POST = entering(acceptInvitationSchema, acceptInvitation);
export const ALL = onlyMethods('POST');
