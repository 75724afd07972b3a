import { timelineQuerySchema } from '@/api-types/timeline';
import { asking, onlyMethods } from '@/server/endpoint';
import { layoutTimeline } from '@/server/timeline';

export const GET = asking(timelineQuerySchema, ({ db, actor, id }, query) =>
  layoutTimeline(db, actor, id, query),
);
export const ALL = onlyMethods('GET');
