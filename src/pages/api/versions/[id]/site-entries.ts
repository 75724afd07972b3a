import { siteEntriesSchema } from '@/api-types/site';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { keepSiteEntries, siteStanding } from '@/server/site/site-entries';

export const GET = reading(({ db, actor, id }) => siteStanding(db, actor, id));
export const POST = writing(siteEntriesSchema, ({ db, actor, id }, input) =>
  keepSiteEntries(db, actor, id, input),
);
export const ALL = onlyMethods('GET', 'POST');
