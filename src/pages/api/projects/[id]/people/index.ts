import { projectPersonSchema } from '@/api-types/members';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { addToProject, projectPeopleOf } from '@/server/project-people';

export const GET = reading(({ db, actor, id }) => projectPeopleOf(db, actor, id));
export const POST = writing(projectPersonSchema, ({ db, actor, id }, { personId }) =>
  addToProject(db, actor, id, personId),
);
export const ALL = onlyMethods('GET', 'POST');
