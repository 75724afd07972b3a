import { onlyMethods, reading } from '@/server/endpoint';
import { endOtherSessions } from '@/server/own-sessions';

export const POST = reading(({ db, actor, context }) =>
  endOtherSessions(db, actor.personId, context.locals.session!.id),
);
export const ALL = onlyMethods('POST');
