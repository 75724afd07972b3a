import { saveVersionSchema } from '@/api-types/versions';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { listVersions, saveVersion } from '@/server/versions';

export const GET = reading(async ({ db, actor, id }) => {
  const list = await listVersions(db, actor, id);
  return list.ok ? done({ versions: list.value }) : list;
});
export const POST = writing(
  saveVersionSchema,
  ({ db, actor, id }, input) => saveVersion(db, actor, id, input),
  201,
);
export const ALL = onlyMethods('GET', 'POST');
