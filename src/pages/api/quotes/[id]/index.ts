import { quoteChangeSchema } from '@/api-types/quotes';
import { onlyMethods, reading, writing } from '@/server/endpoint';
import { changeQuote, dropQuote, openQuote } from '@/server/quotes/quotes';

export const GET = reading(({ db, actor, id }) => openQuote(db, actor, id));
export const PATCH = writing(quoteChangeSchema, ({ db, actor, id }, change) =>
  changeQuote(db, actor, id, change),
);
export const DELETE = reading(({ db, actor, id }) => dropQuote(db, actor, id));
export const ALL = onlyMethods('GET', 'PATCH', 'DELETE');
