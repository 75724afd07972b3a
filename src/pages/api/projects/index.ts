import { newProjectSchema } from '@/api-types/projects';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { createProject, listProjects } from '@/server/projects';

export const GET = reading(async ({ db, actor }) =>
  done({ projects: await listProjects(db, actor) }),
);
export const POST = writing(
  newProjectSchema,
  ({ db, actor }, input) => createProject(db, actor, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
