import { passwordChangeSchema } from '@/api-types/account';
import { onlyMethods, writing } from '@/server/endpoint';
import { visitOf } from '@/server/entering';
import { changePassword } from '@/server/new-passwords';

export const POST = writing(passwordChangeSchema, ({ db, context }, input) =>
  changePassword(db, context.locals.person!, input, visitOf(context)),
);
export const ALL = onlyMethods('POST');
