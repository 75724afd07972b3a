import { newProjectSchema, projectQuerySchema } from '@/api-types/projects';
import { asking, onlyMethods, writing } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { projectPage } from '@/server/project-list';
import { createProject } from '@/server/projects';

export const GET = asking(projectQuerySchema, async ({ db, actor }, query) =>
  done(await projectPage(db, actor, query)),
);
export const POST = writing(
  newProjectSchema,
  ({ db, actor }, input) => createProject(db, actor, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
