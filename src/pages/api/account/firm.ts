import { switchFirmSchema } from '@/api-types/account';
import { onlyMethods, writing } from '@/server/endpoint';
import { switchFirm } from '@/server/own-firms';

export const POST = writing(switchFirmSchema, ({ db, actor, context }, { firmId }) =>
  switchFirm(db, actor.personId, context.locals.session!.id, firmId),
);
export const ALL = onlyMethods('POST');
