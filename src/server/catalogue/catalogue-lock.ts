import { sql } from 'drizzle-orm';
import type { Db } from '../database';

/**
 * Held until the transaction ends by whatever writes prices: an import reads the whole catalogue and then writes it,
 * and a currency may change only while there are no prices.
 */
export const lockCatalogue = (tx: Db, firmId: string): Promise<unknown> =>
  tx.execute(sql`select pg_advisory_xact_lock(hashtext(${`catalogue of ${firmId}`}))`);
