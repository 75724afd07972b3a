import { firmChangeSchema } from '@/api-types/members';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeFirm, openFirm } from '@/server/firm-settings';

export const GET = reading(({ db, actor }) => openFirm(db, actor));
export const PATCH = writing(firmChangeSchema, ({ db, actor }, change) =>
  changeFirm(db, actor, change),
);
export const ALL = onlyMethods('GET', 'PATCH');
