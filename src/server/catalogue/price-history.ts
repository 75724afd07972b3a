import { and, desc, eq } from 'drizzle-orm';
import type { PriceEntry } from '@/api-types/catalogue';
import { cataloguePrices, people } from '@/db/schema';
import type { Db } from '../database';
import { done, type Outcome } from '../outcomes';
import type { Actor } from '../permissions';
import { openItem } from './items';

/** Every price that was entered for an item, the newest day first. */
export const priceHistory = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<{ prices: PriceEntry[] }>> => {
  const item = await openItem(db, actor, id);
  if (!item.ok) return item;
  const rows = await db
    .select({
      costMinor: cataloguePrices.costMinor,
      from: cataloguePrices.fromDay,
      at: cataloguePrices.at,
      by: { id: people.id, name: people.name },
    })
    .from(cataloguePrices)
    .innerJoin(people, eq(people.id, cataloguePrices.setBy))
    .where(and(eq(cataloguePrices.firmId, actor.firmId), eq(cataloguePrices.itemId, id)))
    .orderBy(desc(cataloguePrices.fromDay), desc(cataloguePrices.place));
  return done({
    prices: rows.map((row, n) => ({
      ...row,
      at: row.at.toISOString(),
      corrected: rows[n - 1]?.from === row.from,
    })),
  });
};
