import { inviteSchema } from '@/api-types/invitations';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { invite, listInvitations } from '@/server/invitations';
import { done } from '@/server/outcomes';

export const GET = reading(async ({ db, actor }) => {
  const list = await listInvitations(db, actor);
  return list.ok ? done({ invitations: list.value }) : list;
});
export const POST = writing(inviteSchema, ({ db, actor }, input) => invite(db, actor, input), 201);
export const ALL = onlyMethods('GET', 'POST');
