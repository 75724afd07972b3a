import { and, asc, eq, inArray, isNull } from 'drizzle-orm';
import { catalogueItems } from '@/db/schema';
import type { PriceItem, PriceList } from '@/takeoff/price-list';
import type { Db } from '../database';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { today } from '../today';
import { itemsOn, type ItemRow } from './item-rows';
import { currencyOf } from './pricing-settings';

const priceItem = ({ item, supplierName, price }: ItemRow): PriceItem | null =>
  price && {
    id: item.id,
    kind: item.kind,
    name: item.name,
    supplier: supplierName ?? '',
    pack: {
      name: item.packName,
      holds: item.packHolds,
      measure: item.packMeasure,
      whole: item.packWhole,
    },
    costMinor: price.costMinor,
    from: price.from,
    massKg: item.massKg,
    looseDensity: item.looseDensity,
    stone:
      item.stoneLeast !== null && item.stoneGreatest !== null
        ? [item.stoneLeast, item.stoneGreatest]
        : null,
    ...(item.length !== null && item.width !== null && item.thickness !== null
      ? { size: [item.length, item.width, item.thickness] as const }
      : {}),
    ...(item.retiredAt ? { retired: true as const } : {}),
  };

/**
 * What the catalogue asked on a day for all that it offers, or for the items named alone, retired ones too, since a floor may
 * have been drawn with them. Items that had no price yet are left out.
 */
export const priceListOn = async (
  db: Db,
  firmId: string,
  day: string,
  named?: readonly string[],
): Promise<PriceList> => {
  const rows =
    named?.length === 0
      ? []
      : await itemsOn(db, day)
          .where(
            and(
              eq(catalogueItems.firmId, firmId),
              named ? inArray(catalogueItems.id, [...named]) : isNull(catalogueItems.retiredAt),
            ),
          )
          .orderBy(asc(catalogueItems.id));
  return {
    currency: await currencyOf(db, firmId),
    on: day,
    items: rows.flatMap((row) => priceItem(row) ?? []),
  };
};

/** All that the catalogue offers today, and what of the named it offers no longer. */
export const priceListFor = async (
  db: Db,
  firmId: string,
  named: readonly string[],
): Promise<PriceList> => {
  const day = today();
  const offered = await priceListOn(db, firmId, day);
  const have = new Set(offered.items.map(({ id }) => id));
  const gone = await priceListOn(
    db,
    firmId,
    day,
    named.filter((id) => !have.has(id)),
  );
  return { ...offered, items: [...offered.items, ...gone.items] };
};

/** The firm's price list of a day, for those who see costs. */
export const openPriceList = async (
  db: Db,
  actor: Actor,
  on: string | undefined,
): Promise<Outcome<PriceList>> =>
  refuseUnlessPricing(actor) ?? done(await priceListOn(db, actor.firmId, on ?? today()));
