import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  customType,
  date,
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgTable,
  text,
  unique,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { PackMeasure, PriceKind } from '@/takeoff/price-list';
import { createdAt, instant } from './columns';
import { firms, people } from './firms';

const tsvector = customType<{ data: string }>({ dataType: () => 'tsvector' });

/** Whom the firm buys from. They have no account; orders go to their e-mail address. */
export const suppliers = pgTable(
  'suppliers',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    name: text('name').notNull(),
    email: text('email').notNull().default(''),
    phone: text('phone').notNull().default(''),
    address: text('address').notNull().default(''),
    note: text('note').notNull().default(''),
    /** Counts its saves; a save that started from another is refused. */
    revision: integer('revision').notNull().default(1),
    retiredAt: instant('retired_at'),
    createdAt: createdAt(),
  },
  (table) => [
    unique('suppliers_firm_id').on(table.firmId, table.id),
    uniqueIndex('suppliers_name').on(table.firmId, sql`lower(${table.name})`),
  ],
);

/** What the firm buys: a unit, an aggregate or a sundry, in one supplier's pack. Lengths are mm. */
export const catalogueItems = pgTable(
  'catalogue_items',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id')
      .notNull()
      .references(() => firms.id),
    kind: text('kind').$type<PriceKind>().notNull(),
    name: text('name').notNull(),
    /** The supplier's own number for it. */
    code: text('code').notNull().default(''),
    supplierId: text('supplier_id'),
    packName: text('pack_name').notNull(),
    /** So many of the measure. */
    packHolds: doublePrecision('pack_holds').notNull(),
    packMeasure: text('pack_measure').$type<PackMeasure>().notNull(),
    /** Sold in whole packs only. */
    packWhole: boolean('pack_whole').notNull(),
    length: doublePrecision('length'),
    width: doublePrecision('width'),
    thickness: doublePrecision('thickness'),
    tolerance: doublePrecision('tolerance'),
    /** Of one unit, kg. */
    massKg: doublePrecision('mass_kg'),
    colour: text('colour'),
    /** As delivered, kg/m³. */
    looseDensity: doublePrecision('loose_density'),
    stoneLeast: doublePrecision('stone_least'),
    stoneGreatest: doublePrecision('stone_greatest'),
    note: text('note').notNull().default(''),
    revision: integer('revision').notNull().default(1),
    /** No longer offered; kept for what was made with it. */
    retiredAt: instant('retired_at'),
    createdAt: createdAt(),
    updatedAt: instant('updated_at').notNull().defaultNow(),
    /** The words of name and code, for searching. */
    words: tsvector('words')
      .notNull()
      .generatedAlwaysAs(sql`to_tsvector('simple', name || ' ' || code)`),
  },
  (table) => [
    unique('catalogue_items_firm_id').on(table.firmId, table.id),
    // Of what is offered, each name once a supplier.
    uniqueIndex('catalogue_items_offered')
      .on(table.firmId, sql`lower(${table.name})`, sql`coalesce(${table.supplierId}, '')`)
      .where(sql`retired_at is null`),
    // The ways to sort a list, each within what is offered or retired; `id` settles what is level.
    index('catalogue_items_name')
      .on(table.firmId, sql`lower(${table.name})`, table.id)
      .where(sql`retired_at is null`),
    index('catalogue_items_kind')
      .on(table.firmId, table.kind, sql`lower(${table.name})`, table.id)
      .where(sql`retired_at is null`),
    index('catalogue_items_updated')
      .on(table.firmId, table.updatedAt, table.id)
      .where(sql`retired_at is null`),
    index('catalogue_items_retired')
      .on(table.firmId, table.retiredAt, table.id)
      .where(sql`retired_at is not null`),
    index('catalogue_items_supplier').on(
      table.firmId,
      table.supplierId,
      sql`lower(${table.name})`,
      table.id,
    ),
    index('catalogue_items_words').using('gin', table.words).with({ fastupdate: false }),
    foreignKey({
      name: 'catalogue_items_supplier_fk',
      columns: [table.firmId, table.supplierId],
      foreignColumns: [suppliers.firmId, suppliers.id],
    }),
    check('catalogue_items_kind_known', sql`${table.kind} in ('unit', 'aggregate', 'sundry')`),
    check(
      'catalogue_items_measure',
      sql`${table.packMeasure} in ('each', 'm', 'm2', 'm3', 't', 'kg')`,
    ),
    check('catalogue_items_pack', sql`${table.packHolds} > 0`),
    check(
      'catalogue_items_stone',
      sql`(${table.stoneLeast} is null) = (${table.stoneGreatest} is null)`,
    ),
  ],
);

/**
 * What an item costs from a day on, for one pack, without tax. A price is never written over: the list of a day takes
 * the newest day not after it, and of one day what was entered last.
 */
export const cataloguePrices = pgTable(
  'catalogue_prices',
  {
    id: text('id').primaryKey(),
    firmId: text('firm_id').notNull(),
    itemId: text('item_id').notNull(),
    /** The day it holds from, `2026-03-01`. */
    fromDay: date('from_day', { mode: 'string' }).notNull(),
    /** Order of the prices of one item, from 1, as they were entered. */
    place: integer('place').notNull(),
    costMinor: bigint('cost_minor', { mode: 'number' }).notNull(),
    setBy: text('set_by')
      .notNull()
      .references(() => people.id),
    at: instant('at').notNull().defaultNow(),
  },
  (table) => [
    unique('catalogue_prices_place').on(table.firmId, table.itemId, table.place),
    index('catalogue_prices_day').on(table.firmId, table.itemId, table.fromDay, table.place),
    foreignKey({
      name: 'catalogue_prices_item',
      columns: [table.firmId, table.itemId],
      foreignColumns: [catalogueItems.firmId, catalogueItems.id],
    }).onDelete('cascade'),
    check('catalogue_prices_cost', sql`${table.costMinor} >= 0`),
  ],
);
