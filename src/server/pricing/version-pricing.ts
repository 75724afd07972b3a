import { and, eq } from 'drizzle-orm';
import type { VersionPricing } from '@/api-types/quotes';
import { versionPricings } from '@/db/schema';
import type { Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import type { Report } from '@/paving/report';
import type { PriceList } from '@/takeoff/price-list';
import { takeOff, type TakeOff } from '@/takeoff/take-off';
import { priceListOn } from '../catalogue/price-list';
import type { Db } from '../database';
import { done, notFound, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { seenVersion } from '../seen-version';
import { today } from '../today';
import { namedItems, typedPrices } from './layout-prices';

export interface Priced {
  readonly takeOff: TakeOff;
  readonly priceList: PriceList;
}

/** A floor's take-off at today's prices, the catalogue's and those typed for its layout, and of the list what it is priced by. */
export const pricedFloor = async (
  db: Db,
  firmId: string,
  layoutId: string,
  floor: { readonly document: LayoutDocument; readonly laying: Laying; readonly report: Report },
): Promise<Priced> => {
  const listed = await priceListOn(db, firmId, today(), namedItems(floor.document));
  const list = { ...listed, typed: await typedPrices(db, firmId, layoutId) };
  const taken = takeOff(floor.laying, floor.report, list);
  const used = new Set(taken.orders.flatMap(({ item }) => (item ? [item.id] : [])));
  return {
    takeOff: taken,
    priceList: {
      ...list,
      items: list.items.filter(({ id }) => used.has(id)),
      typed: list.typed.filter(({ orderId }) =>
        taken.orders.some(({ id, priceTyped }) => id === orderId && priceTyped),
      ),
    },
  };
};

/** Keeps a version's take-off and prices, in the transaction that saves the version. */
export const freezePricing = async (
  tx: Db,
  firmId: string,
  versionId: string,
  priced: Priced,
): Promise<void> => {
  await tx.insert(versionPricings).values({ firmId, versionId, ...priced });
};

/** What a version was priced with when it was saved; null for one saved before that was kept. */
export const pricingOfVersion = async (
  db: Db,
  firmId: string,
  versionId: string,
): Promise<VersionPricing | null> => {
  const [row] = await db
    .select()
    .from(versionPricings)
    .where(and(eq(versionPricings.firmId, firmId), eq(versionPricings.versionId, versionId)));
  if (!row) return null;
  const { takeOff: frozen, priceList, at } = row;
  return { versionId, takeOff: frozen, priceList, at: at.toISOString() };
};

/** Not found for those who do not see the version, not allowed for those who see it but not what it costs. */
export const openVersionPricing = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<VersionPricing>> => {
  if (!(await seenVersion(db, actor, versionId))) return notFound('version');
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const pricing = await pricingOfVersion(db, actor.firmId, versionId);
  return pricing ? done(pricing) : notFound('take-off of this version');
};
