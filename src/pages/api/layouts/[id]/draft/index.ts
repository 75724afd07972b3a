import { saveDraftSchema } from '@/api-types/layouts';
import { openDraft, saveDraft } from '@/server/drafts';
import { onlyMethods, reading, writing } from '@/server/endpoint';

export const GET = reading(({ db, actor, id }) => openDraft(db, actor, id));
export const PUT = writing(saveDraftSchema, ({ db, actor, id }, save) =>
  saveDraft(db, actor, id, save),
);
export const ALL = onlyMethods('GET', 'PUT');
