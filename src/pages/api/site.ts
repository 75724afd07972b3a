import { onlyMethods, reading } from '@/server/endpoint';
import { listSitePacks } from '@/server/site/site-packs';

export const GET = reading(({ db, actor, context }) => {
  const { person, firm } = context.locals;
  return listSitePacks(db, actor, { ...person!, firm: firm!, role: actor.role });
});
export const ALL = onlyMethods('GET');
