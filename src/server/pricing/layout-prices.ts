import { and, asc, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { LayoutPrices, layoutPriceSchema } from '@/api-types/layout-prices';
import { drafts, layoutPrices } from '@/db/schema';
import type { LayoutDocument } from '@/paving/layout-document';
import type { PriceList, TypedPrice } from '@/takeoff/price-list';
import { currencyOf } from '../catalogue/pricing-settings';
import { priceListFor } from '../catalogue/price-list';
import type { Db } from '../database';
import { draftingLayout, ofDraft } from '../drafts';
import { done, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';

/** Every entry of the catalogue that a document names: of its units, its aggregate and its materials. */
export const namedItems = (part: LayoutDocument | unknown): string[] => {
  if (Array.isArray(part)) return part.flatMap(namedItems);
  if (part === null || typeof part !== 'object') return [];
  return Object.entries(part).flatMap(([name, value]) =>
    name === 'catalogueId' && typeof value === 'string' ? [value] : namedItems(value),
  );
};

const ofLayout = (firmId: string, layoutId: string) =>
  and(eq(layoutPrices.firmId, firmId), eq(layoutPrices.layoutId, layoutId));

/** What was typed for a layout's orders in the firm's currency of today; in another it would mean another sum. */
export const typedPrices = async (
  db: Db,
  firmId: string,
  layoutId: string,
): Promise<TypedPrice[]> => {
  const currency = await currencyOf(db, firmId);
  const rows = await db
    .select()
    .from(layoutPrices)
    .where(and(ofLayout(firmId, layoutId), eq(layoutPrices.currency, currency)))
    .orderBy(asc(layoutPrices.orderId));
  return rows.map(({ orderId, costMinor, packHolds, packMeasure }) => ({
    orderId,
    costMinor,
    pack: { holds: packHolds, measure: packMeasure },
  }));
};

const pricedLayout = async (db: Db, actor: Actor, layoutId: string) => {
  const layout = await draftingLayout(db, actor, layoutId);
  return layout.ok ? (refuseUnlessPricing(actor) ?? layout) : layout;
};

/** What the table prices a layout with: the catalogue, what its draft names that is offered no longer, and what was typed. */
export const openLayoutPriceList = async (
  db: Db,
  actor: Actor,
  layoutId: string,
): Promise<Outcome<PriceList>> => {
  const layout = await pricedLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  const [draft] = await db
    .select({ document: drafts.document })
    .from(drafts)
    .where(ofDraft(actor, layoutId));
  const list = await priceListFor(db, actor.firmId, namedItems(draft.document));
  return done({ ...list, typed: await typedPrices(db, actor.firmId, layoutId) });
};

/** Keeps a typed price, or takes it away. Versions saved before keep theirs. */
export const setLayoutPrice = async (
  db: Db,
  actor: Actor,
  layoutId: string,
  { orderId, price }: z.output<typeof layoutPriceSchema>,
): Promise<Outcome<LayoutPrices>> => {
  const layout = await pricedLayout(db, actor, layoutId);
  if (!layout.ok) return layout;
  if (price === null) {
    await db
      .delete(layoutPrices)
      .where(and(ofLayout(actor.firmId, layoutId), eq(layoutPrices.orderId, orderId)));
  } else {
    const set = {
      currency: await currencyOf(db, actor.firmId),
      costMinor: price.costMinor,
      packHolds: price.pack.holds,
      packMeasure: price.pack.measure,
      setBy: actor.personId,
      at: sql`now()`,
    };
    await db
      .insert(layoutPrices)
      .values({ firmId: actor.firmId, layoutId, orderId, ...set })
      .onConflictDoUpdate({
        target: [layoutPrices.firmId, layoutPrices.layoutId, layoutPrices.orderId],
        set,
      });
  }
  return done({ typed: await typedPrices(db, actor.firmId, layoutId) });
};

/** What was typed for one layout, for a copy of it as well. */
export const copyLayoutPrices = async (
  tx: Db,
  { firmId, personId }: Actor,
  from: string,
  to: string,
): Promise<void> => {
  const rows = await tx.select().from(layoutPrices).where(ofLayout(firmId, from));
  if (rows.length === 0) return;
  await tx
    .insert(layoutPrices)
    .values(rows.map((row) => ({ ...row, layoutId: to, setBy: personId })))
    .onConflictDoNothing();
};
