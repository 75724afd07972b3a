import { liveStreamQuerySchema } from '@/api-types/live';
import { onlyMethods, streaming } from '@/server/endpoint';
import { liveStream } from '@/server/live-stream';

export const GET = streaming(liveStreamQuerySchema, 'text/event-stream', (call, query) => {
  const { db, actor, id, context } = call;
  return liveStream(db, actor, id, context.locals.session?.id ?? '', query.for);
});
export const ALL = onlyMethods('GET');
