import { sql } from 'drizzle-orm';
import { bigint, check, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { firms } from './firms';

/** What a firm's quotes and orders begin with; a firm without a row has what a new one has. */
export const firmPricing = pgTable(
  'firm_pricing',
  {
    firmId: text('firm_id')
      .primaryKey()
      .references(() => firms.id),
    /** ISO 4217; what every price of the catalogue is in. */
    currency: text('currency').notNull(),
    taxName: text('tax_name').notNull(),
    taxBasisPoints: integer('tax_basis_points').notNull(),
    taxOn: text('tax_on').$type<'lines' | 'sum'>().notNull(),
    marginOf: text('margin_of').$type<'cost' | 'price'>().notNull(),
    marginBasisPoints: integer('margin_basis_points').notNull(),
    labourHourMinor: bigint('labour_hour_minor', { mode: 'number' }).notNull(),
    labourAreaMinor: bigint('labour_area_minor', { mode: 'number' }).notNull(),
    validDays: integer('valid_days').notNull(),
    quoteTerms: text('quote_terms').notNull(),
    orderTerms: text('order_terms').notNull(),
    quotePrefix: text('quote_prefix').notNull(),
    orderPrefix: text('order_prefix').notNull(),
    address: text('address').notNull(),
    phone: text('phone').notNull(),
    email: text('email').notNull(),
    registration: text('registration').notNull(),
    paper: text('paper').$type<'A4' | 'Letter'>().notNull(),
    revision: integer('revision').notNull(),
  },
  (table) => [
    check('firm_pricing_currency', sql`${table.currency} ~ '^[A-Z]{3}$'`),
    check('firm_pricing_tax_on', sql`${table.taxOn} in ('lines', 'sum')`),
    check('firm_pricing_margin_of', sql`${table.marginOf} in ('cost', 'price')`),
    check('firm_pricing_paper', sql`${table.paper} in ('A4', 'Letter')`),
  ],
);

/** The number that a firm's next quote or order takes; numbers have no gaps and none is given twice. */
export const numberSequences = pgTable(
  'number_sequences',
  {
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    kind: text('kind').$type<'quote' | 'order'>().notNull(),
    next: integer('next').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.firmId, table.kind] }),
    check('number_sequences_kind', sql`${table.kind} in ('quote', 'order')`),
  ],
);
