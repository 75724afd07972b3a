import { onlyMethods, reading } from '@/server/endpoint';
import { listMembers } from '@/server/members';
import { done } from '@/server/outcomes';

export const GET = reading(async ({ db, actor }) => {
  const list = await listMembers(db, actor);
  return list.ok ? done({ people: list.value }) : list;
});
export const ALL = onlyMethods('GET');
