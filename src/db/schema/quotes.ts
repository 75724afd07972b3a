import { sql } from 'drizzle-orm';
import {
  check,
  date,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { QuoteDraft, SentQuote } from '@/api-types/quotes';
import type { PriceList } from '@/takeoff/price-list';
import type { TakeOff } from '@/takeoff/take-off';
import { createdAt, instant } from './columns';
import { people } from './firms';
import { versions } from './versions';

/**
 * The take-off of a version and the prices that it was reckoned with, as the server made them out when the version was
 * saved. Beside the version and not in it, since those who see a version do not all see what it costs. A trigger
 * refuses UPDATE and DELETE.
 */
export const versionPricings = pgTable(
  'version_pricings',
  {
    firmId: text('firm_id').notNull(),
    versionId: text('version_id').notNull(),
    takeOff: jsonb('take_off').$type<TakeOff>().notNull(),
    /** Of the catalogue only what the take-off is priced by. */
    priceList: jsonb('price_list').$type<PriceList>().notNull(),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.versionId] }),
    foreignKey({
      name: 'version_pricings_version',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
  ],
);

/** A quote of a version. Once it is sent it has its number and is frozen: a trigger refuses UPDATE and DELETE. */
export const quotes = pgTable(
  'quotes',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    versionId: text('version_id').notNull(),
    state: text('state').$type<'draft' | 'sent'>().notNull().default('draft'),
    /** Null while it is a draft. */
    number: text('number'),
    draft: jsonb('draft').$type<QuoteDraft>().notNull(),
    /** What was sent, word for word and sum for sum; null while it is a draft. */
    sent: jsonb('sent').$type<SentQuote>(),
    validUntil: date('valid_until', { mode: 'string' }),
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
    unique('quotes_firm_id').on(table.firmId, table.id),
    unique('quotes_number').on(table.firmId, table.number),
    uniqueIndex('quotes_one_draft')
      .on(table.firmId, table.versionId)
      .where(sql`state = 'draft'`),
    index('quotes_version').on(table.firmId, table.versionId, table.createdAt),
    foreignKey({
      name: 'quotes_version_fk',
      columns: [table.firmId, table.versionId],
      foreignColumns: [versions.firmId, versions.id],
    }),
    check('quotes_state', sql`${table.state} in ('draft', 'sent')`),
    check(
      'quotes_sent',
      sql`(${table.state} = 'sent') = (${table.number} is not null and ${table.sent} is not null
        and ${table.sentAt} is not null and ${table.sentBy} is not null)`,
    ),
  ],
);
