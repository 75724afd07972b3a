import { comparisonQuerySchema } from '@/api-types/comparison';
import { compareVersions } from '@/server/comparison';
import { asking, onlyMethods } from '@/server/endpoint';

export const GET = asking(comparisonQuerySchema, ({ db, actor }, query) =>
  compareVersions(db, actor, query),
);
export const ALL = onlyMethods('GET');
