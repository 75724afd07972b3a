import { quoteSendSchema } from '@/api-types/quotes';
import { onlyMethods, writing } from '@/server/endpoint';
import { sendQuote } from '@/server/quotes/quote-sending';

export const POST = writing(quoteSendSchema, ({ db, actor, id }, input) =>
  sendQuote(db, actor, id, input),
);
export const ALL = onlyMethods('POST');
