import { z } from 'zod';
import { fetching, onlyMethods } from '@/server/endpoint';
import { openQuotePdf } from '@/server/quotes/quote-paper';

export const GET = fetching(z.object({}), 'application/pdf', ({ db, actor, id }) =>
  openQuotePdf(db, actor, id),
);
export const ALL = onlyMethods('GET');
