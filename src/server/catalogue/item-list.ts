import { and, asc, desc, eq, isNotNull, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { catalogueQuerySchema, CataloguePage } from '@/api-types/catalogue';
import { catalogueItems } from '@/db/schema';
import type { Db } from '../database';
import { keyRead, keyWritten, MOMENT } from '../keyset';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { today } from '../today';
import { wordsMatch } from '../word-search';
import { itemOf, itemsOn } from './item-rows';
import { currencyOf } from './pricing-settings';

type Query = z.output<typeof catalogueQuerySchema>;

/** Ways to order the list: by name, or by moment with the newest first; `id` settles what is level. */
const ORDERS = {
  name: { by: sql`lower(${catalogueItems.name})`, key: 'key', moment: false },
  updated: { by: sql`${catalogueItems.updatedAt}`, key: 'touched', moment: true },
  retired: { by: sql`${catalogueItems.retiredAt}`, key: 'left', moment: true },
} as const;

/** One page of the firm's catalogue with today's prices. */
export const cataloguePage = async (
  db: Db,
  actor: Actor,
  query: Query,
): Promise<Outcome<CataloguePage>> => {
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const order = ORDERS[query.retired === 'only' ? 'retired' : query.sort];
  const read = keyRead(query.after);
  const key = read && (!order.moment || MOMENT.test(read.at)) ? read : null;
  const after =
    key &&
    (order.moment
      ? sql`(${order.by}, ${catalogueItems.id}) < (${key.at}::timestamptz, ${key.id})`
      : sql`(${order.by}, ${catalogueItems.id}) > (${key.at}, ${key.id})`);
  const direction = order.moment ? desc : asc;
  const rows = await itemsOn(db, today())
    .where(
      and(
        eq(catalogueItems.firmId, actor.firmId),
        query.retired === 'only'
          ? isNotNull(catalogueItems.retiredAt)
          : isNull(catalogueItems.retiredAt),
        query.kind && eq(catalogueItems.kind, query.kind),
        query.supplier === undefined ? undefined : eq(catalogueItems.supplierId, query.supplier),
        wordsMatch(catalogueItems.words, query.search),
        after ?? undefined,
      ),
    )
    .orderBy(direction(order.by), direction(catalogueItems.id))
    .limit(query.size + 1);
  const page = rows.slice(0, query.size);
  const last = page.at(-1);
  return done({
    items: page.map(itemOf),
    next:
      rows.length > query.size && last
        ? keyWritten({ at: last[order.key], id: last.item.id })
        : null,
    currency: await currencyOf(db, actor.firmId),
  });
};
