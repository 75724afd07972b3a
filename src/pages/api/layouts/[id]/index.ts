import { layoutChangeSchema } from '@/api-types/layouts';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeLayout } from '@/server/layout-changes';
import { openLayout } from '@/server/layouts';

export const GET = reading(({ db, actor, id }) => openLayout(db, actor, id));
export const PATCH = writing(layoutChangeSchema, ({ db, actor, id }, change) =>
  changeLayout(db, actor, id, change),
);
export const ALL = onlyMethods('GET', 'PATCH');
