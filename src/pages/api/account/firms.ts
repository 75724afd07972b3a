import { onlyMethods, reading } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { listOwnFirms } from '@/server/own-firms';

export const GET = reading(async ({ db, actor }) =>
  done({ firms: await listOwnFirms(db, actor.personId, actor.firmId) }),
);
export const ALL = onlyMethods('GET');
