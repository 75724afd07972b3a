import { z } from 'zod';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { beginQuote, listQuotes } from '@/server/quotes/quotes';

export const GET = reading(({ db, actor, id }) => listQuotes(db, actor, id));
export const POST = writing(z.object({}), ({ db, actor, id }) => beginQuote(db, actor, id), 201);
export const ALL = onlyMethods('GET', 'POST');
