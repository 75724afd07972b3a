import { sql } from 'drizzle-orm';
import {
  check,
  date,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { PurchaseLine, SentOrder } from '@/api-types/purchase-orders';
import { suppliers } from './catalogue';
import { createdAt, instant } from './columns';
import { people } from './firms';
import { versions } from './versions';

/** What is ordered of one supplier for one version. Once sent it is numbered and frozen by a trigger, as quotes are. */
export const purchaseOrders = pgTable(
  'purchase_orders',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    versionId: text('version_id').notNull(),
    supplierId: text('supplier_id').notNull(),
    state: text('state').$type<'draft' | 'sent'>().notNull().default('draft'),
    number: text('number'),
    lines: jsonb('lines').$type<readonly PurchaseLine[]>().notNull(),
    deliveryDay: date('delivery_day', { mode: 'string' }),
    deliveryPlace: text('delivery_place').notNull().default(''),
    note: text('note').notNull().default(''),
    sent: jsonb('sent').$type<SentOrder>(),
    /** Of the letter that took it there. */
    letterId: text('letter_id'),
    revision: integer('revision').notNull().default(1),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
    updatedAt: instant('updated_at').notNull().defaultNow(),
    sentBy: text('sent_by').references(() => people.id),
    sentAt: instant('sent_at'),
  },
  (table) => [
    unique('purchase_orders_firm_id').on(table.firmId, table.id),
    unique('purchase_orders_number').on(table.firmId, table.number),
    uniqueIndex('purchase_orders_one_draft')
      .on(table.firmId, table.versionId, table.supplierId)
      .where(sql`state = 'draft'`),
    index('purchase_orders_version').on(table.firmId, table.versionId, table.createdAt),
    foreignKey({
      name: 'purchase_orders_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    foreignKey({
      name: 'purchase_orders_supplier',
      columns: [table.firmId, table.supplierId],
      foreignColumns: [suppliers.firmId, suppliers.id],
    }),
    check('purchase_orders_state', sql`${table.state} in ('draft', 'sent')`),
    check(
      'purchase_orders_sent',
      sql`(${table.state} = 'sent') = (${table.number} is not null and ${table.sent} is not null
        and ${table.sentAt} is not null and ${table.sentBy} is not null)`,
    ),
  ],
);
