import { sql } from 'drizzle-orm';
import {
  bigint,
  check,
  doublePrecision,
  foreignKey,
  pgTable,
  primaryKey,
  text,
} from 'drizzle-orm/pg-core';
import type { PackMeasure } from '@/takeoff/price-list';
import { instant } from './columns';
import { people } from './firms';
import { layouts } from './layouts';

/**
 * Prices that somebody typed for a layout's orders, of things that the catalogue has no price of. They are beside the layout's
 * document and not in it, for documents are shown to clients and crews.
 */
export const layoutPrices = pgTable(
  'layout_prices',
  {
    firmId: text('firm_id').notNull(),
    layoutId: text('layout_id').notNull(),
    /** The take-off's own id of what is ordered. */
    orderId: text('order_id').notNull(),
    /** ISO 4217, of the day it was typed. */
    currency: text('currency').notNull(),
    /** For one pack, without tax. */
    costMinor: bigint('cost_minor', { mode: 'number' }).notNull(),
    /** The pack that it is for; of another pack it says nothing. */
    packHolds: doublePrecision('pack_holds').notNull(),
    packMeasure: text('pack_measure').$type<PackMeasure>().notNull(),
    setBy: text('set_by')
      .notNull()
      .references(() => people.id),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.layoutId, table.orderId] }),
    foreignKey({
      name: 'layout_prices_layout',
      columns: [table.firmId, table.layoutId],
      foreignColumns: [layouts.firmId, layouts.id],
    }),
    check('layout_prices_cost', sql`${table.costMinor} >= 0`),
    check('layout_prices_holds', sql`${table.packHolds} > 0`),
  ],
);
