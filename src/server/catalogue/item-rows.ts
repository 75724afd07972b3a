import { and, eq, sql, type SQL } from 'drizzle-orm';
import type { CatalogueItem, CataloguePrice, ItemFields } from '@/api-types/catalogue';
import { catalogueItems, cataloguePrices, suppliers } from '@/db/schema';
import type { Db } from '../database';

/** Drivers give JSON made in a query as text or as what it says. */
const jsonRead = <T>(value: unknown): T =>
  (typeof value === 'string' ? JSON.parse(value) : value) as T;

const priceWhere = (condition: SQL, order: SQL) =>
  sql<CataloguePrice | null>`(select json_build_object('costMinor', ${cataloguePrices.costMinor}, 'from', ${cataloguePrices.fromDay})
    from ${cataloguePrices} where ${cataloguePrices.firmId} = ${catalogueItems.firmId}
    and ${cataloguePrices.itemId} = ${catalogueItems.id} and ${condition}
    order by ${order} limit 1)`.mapWith((value) => jsonRead<CataloguePrice | null>(value));

/** The price that holds on a day: of the newest day not after it, what was entered last. */
const priceOn = (day: string) =>
  priceWhere(
    sql`${cataloguePrices.fromDay} <= ${day}`,
    sql`${cataloguePrices.fromDay} desc, ${cataloguePrices.place} desc`,
  );

const priceAfter = (day: string) =>
  priceWhere(
    sql`${cataloguePrices.fromDay} > ${day}`,
    sql`${cataloguePrices.fromDay} asc, ${cataloguePrices.place} desc`,
  );

/** Items of a catalogue with their supplier and prices, in a query to be narrowed; the supplier is joined always. */
export const itemsOn = (db: Db, day: string) =>
  db
    .select({
      item: catalogueItems,
      supplierName: suppliers.name,
      price: priceOn(day),
      nextPrice: priceAfter(day),
      key: sql<string>`lower(${catalogueItems.name})`,
      touched: sql<string>`${catalogueItems.updatedAt}::text`,
      left: sql<string>`coalesce(${catalogueItems.retiredAt}::text, '')`,
    })
    .from(catalogueItems)
    .leftJoin(
      suppliers,
      and(eq(suppliers.firmId, catalogueItems.firmId), eq(suppliers.id, catalogueItems.supplierId)),
    )
    .$dynamic();

export type ItemRow = Awaited<ReturnType<typeof itemsOn>>[number];

/** The fields of an item that a person gives. */
export const fieldsOf = (item: typeof catalogueItems.$inferSelect): ItemFields => ({
  kind: item.kind,
  name: item.name,
  code: item.code,
  supplierId: item.supplierId,
  packName: item.packName,
  packHolds: item.packHolds,
  packMeasure: item.packMeasure,
  packWhole: item.packWhole,
  length: item.length,
  width: item.width,
  thickness: item.thickness,
  tolerance: item.tolerance,
  massKg: item.massKg,
  colour: item.colour,
  looseDensity: item.looseDensity,
  stoneLeast: item.stoneLeast,
  stoneGreatest: item.stoneGreatest,
  note: item.note,
});

/** An item as the browser gets it. */
export const itemOf = ({ item, supplierName, price, nextPrice }: ItemRow): CatalogueItem => ({
  id: item.id,
  ...fieldsOf(item),
  revision: item.revision,
  supplierName,
  price,
  nextPrice,
  retiredAt: item.retiredAt?.toISOString() ?? null,
  updatedAt: item.updatedAt.toISOString(),
});
