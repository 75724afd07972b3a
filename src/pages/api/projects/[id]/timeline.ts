import { timelineQuerySchema } from '@/api-types/timeline';
import { asking, onlyMethods } from '@/server/endpoint';
import { projectTimeline } from '@/server/timeline';

export const GET = asking(timelineQuerySchema, ({ db, actor, id }, query) =>
  projectTimeline(db, actor, id, query),
);
export const ALL = onlyMethods('GET');
