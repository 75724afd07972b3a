import { onlyMethods, reading } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { unreadThreads } from '@/server/unread';

export const GET = reading(async ({ db, actor }) => done(await unreadThreads(db, actor)));
export const ALL = onlyMethods('GET');
