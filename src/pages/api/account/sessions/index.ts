import { onlyMethods, reading } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { listOwnSessions } from '@/server/own-sessions';

export const GET = reading(async ({ db, actor, context }) =>
  done({ sessions: await listOwnSessions(db, actor.personId, context.locals.session!.id) }),
);
export const ALL = onlyMethods('GET');
