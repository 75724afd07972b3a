import { onlyMethods, reading } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { listSetAside } from '@/server/set-aside';

export const GET = reading(async ({ db, actor, id }) => {
  const list = await listSetAside(db, actor, id);
  return list.ok ? done({ setAside: list.value }) : list;
});
export const ALL = onlyMethods('GET');
