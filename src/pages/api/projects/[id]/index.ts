import { projectChangeSchema } from '@/api-types/projects';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeProject, openProject } from '@/server/projects';

export const GET = reading(({ db, actor, id }) => openProject(db, actor, id));
export const PATCH = writing(projectChangeSchema, ({ db, actor, id }, change) =>
  changeProject(db, actor, id, change),
);
export const ALL = onlyMethods('GET', 'PATCH');
