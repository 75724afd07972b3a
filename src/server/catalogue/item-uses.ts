import { sql } from 'drizzle-orm';
import { drafts, purchaseOrders, setAsideDrafts, versionPricings, versions } from '@/db/schema';
import type { Db } from '../database';
import type { Actor } from '../permissions';

/**
 * Whether anything that is kept names an item: a draft, work set aside, a version, a price list frozen with one, or an order.
 * An id is 24 random characters, so text that holds it names it.
 */
export const itemUses = async (tx: Db, { firmId }: Actor, id: string): Promise<boolean> => {
  const named = `%${id}%`;
  const [row] = await tx
    .select({
      used: sql<boolean>`exists (select 1 from ${drafts} where firm_id = ${firmId} and document::text like ${named})
        or exists (select 1 from ${setAsideDrafts} where firm_id = ${firmId} and document::text like ${named})
        or exists (select 1 from ${versions} where firm_id = ${firmId} and document::text like ${named})
        or exists (select 1 from ${versionPricings} where firm_id = ${firmId} and price_list::text like ${named})
        or exists (select 1 from ${purchaseOrders} where firm_id = ${firmId} and lines::text like ${named})`,
    })
    .from(sql`(select 1) as one`);
  return row.used;
};
