import { projectPersonSchema } from '@/api-types/members';
import { onlyMethods, writing } from '@/server/endpoint';
import { removeFromProject } from '@/server/project-people';

export const POST = writing(projectPersonSchema, ({ db, actor, id }, { personId }) =>
  removeFromProject(db, actor, id, personId),
);
export const ALL = onlyMethods('POST');
