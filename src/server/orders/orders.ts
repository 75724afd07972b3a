import { and, asc, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type {
  newOrdersSchema,
  orderChangeSchema,
  PurchaseOrder,
  VersionOrders,
} from '@/api-types/purchase-orders';
import { purchaseOrders } from '@/db/schema';
import { recordAudit } from '../audit';
import { currencyOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { newId } from '../ids';
import { changedMeanwhile, done, invalid, notFound, type Outcome } from '../outcomes';
import { refuseUnlessPricing, type Actor } from '../permissions';
import { pricingOfVersion } from '../pricing/version-pricing';
import { seenVersion, type SeenVersion } from '../seen-version';
import { ordersSplit } from './order-drafts';
import { ofOrder, orderOf, orderRows, type OrderRow } from './order-rows';
import { ordersElsewhere } from './orders-elsewhere';

const ordersOf = async (db: Db, actor: Actor, versionId: string): Promise<OrderRow[]> =>
  orderRows(db)
    .where(and(eq(purchaseOrders.firmId, actor.firmId), eq(purchaseOrders.versionId, versionId)))
    .orderBy(asc(purchaseOrders.createdAt), asc(purchaseOrders.id));

/** The orders of a version, oldest first, what nobody sells, and what went for other versions of the project. */
export const listOrders = async (
  db: Db,
  actor: Actor,
  versionId: string,
): Promise<Outcome<VersionOrders>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const currency = await currencyOf(db, actor.firmId);
  const pricing = await pricingOfVersion(db, actor.firmId, versionId);
  const split = pricing && (await ordersSplit(db, actor.firmId, pricing.takeOff));
  return done({
    orders: (await ordersOf(db, actor, versionId)).map((row) => orderOf(row, currency)),
    unsupplied: split?.unsupplied ?? [],
    elsewhere: await ordersElsewhere(db, version),
  });
};

/** Drafts from the version's take-off: one a supplier that has no order yet, or one more for the supplier asked for. */
export const beginOrders = async (
  db: Db,
  actor: Actor,
  versionId: string,
  { supplierId }: z.output<typeof newOrdersSchema>,
): Promise<Outcome<VersionOrders>> => {
  const version = await seenVersion(db, actor, versionId);
  if (!version) return notFound('version');
  const refusal = refuseUnlessPricing(actor);
  if (refusal) return refusal;
  const pricing = await pricingOfVersion(db, actor.firmId, versionId);
  if (!pricing) {
    return changedMeanwhile(
      'This version was saved before take-offs were kept with versions. Save its floor as a new version and order from that.',
    );
  }
  const { bySupplier } = await ordersSplit(db, actor.firmId, pricing.takeOff);
  if (supplierId !== undefined && !bySupplier.some((own) => own.supplierId === supplierId)) {
    return invalid('This version takes nothing that this supplier sells.', [
      { path: ['supplierId'], message: 'sells nothing that this version takes' },
    ]);
  }
  await db.transaction(async (tx) => {
    const there = await ordersOf(tx, actor, versionId);
    for (const { supplierId: own, lines } of bySupplier) {
      const has = there.some(
        ({ order }) =>
          order.supplierId === own && (supplierId === undefined || order.state === 'draft'),
      );
      if (has || (supplierId !== undefined && supplierId !== own)) continue;
      const id = newId();
      const [made] = await tx
        .insert(purchaseOrders)
        .values({
          id,
          firmId: actor.firmId,
          versionId,
          supplierId: own,
          lines,
          createdBy: actor.personId,
        })
        .onConflictDoNothing()
        .returning({ id: purchaseOrders.id });
      if (made) {
        await recordAudit(tx, actor, 'order.begun', { type: 'order', id }, { versionId });
      }
    }
  });
  return listOrders(db, actor, versionId);
};

/** An order with the version it is for, if the actor sees the version and costs. */
export const pricedOrder = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<{ row: OrderRow; version: SeenVersion }>> => {
  const [row] = await orderRows(db).where(ofOrder(actor.firmId, id));
  const version = row && (await seenVersion(db, actor, row.order.versionId));
  if (!version) return notFound('order');
  return refuseUnlessPricing(actor) ?? done({ row, version });
};

/** Not found: no such one. Not allowed: who does not see costs. */
export const openOrder = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<PurchaseOrder>> => {
  const found = await pricedOrder(db, actor, id);
  return found.ok ? done(orderOf(found.value.row, await currencyOf(db, actor.firmId))) : found;
};

/** Locks a draft that is still at the revision that the person saw; else says what became of it. */
export const lockedOrder = async (
  tx: Db,
  actor: Actor,
  id: string,
  revision: number | null,
): Promise<Outcome<typeof purchaseOrders.$inferSelect>> => {
  const [row] = await tx
    .select()
    .from(purchaseOrders)
    .where(ofOrder(actor.firmId, id))
    .for('update');
  if (!row) return notFound('order');
  if (row.state === 'sent') {
    return changedMeanwhile(
      `This order was sent as ${row.number} and stays as it is. It is not sent a second time.`,
    );
  }
  if (revision !== null && row.revision !== revision) {
    const current = await openOrder(tx, actor, id);
    return changedMeanwhile(
      'This order was changed since you opened it, so yours was not stored over it.',
      current.ok ? { current: current.value } : undefined,
    );
  }
  return done(row);
};

/** Changes a draft. Changed meanwhile: another revision, or sent already. */
export const changeOrder = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision, ...change }: z.output<typeof orderChangeSchema>,
): Promise<Outcome<PurchaseOrder>> => {
  const found = await pricedOrder(db, actor, id);
  if (!found.ok) return found;
  const changed = await db.transaction(async (tx): Promise<Outcome<null>> => {
    const locked = await lockedOrder(tx, actor, id, revision);
    if (!locked.ok) return locked;
    await tx
      .update(purchaseOrders)
      .set({ ...change, revision: revision + 1, updatedAt: new Date() })
      .where(ofOrder(actor.firmId, id));
    return done(null);
  });
  return changed.ok ? openOrder(db, actor, id) : changed;
};

/** Throws a draft away; what was sent stays. */
export const dropOrder = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Record<string, never>>> => {
  const found = await pricedOrder(db, actor, id);
  if (!found.ok) return found;
  return db.transaction(async (tx): Promise<Outcome<Record<string, never>>> => {
    const locked = await lockedOrder(tx, actor, id, null);
    if (!locked.ok) return locked;
    await tx.delete(purchaseOrders).where(ofOrder(actor.firmId, id));
    const { versionId } = locked.value;
    await recordAudit(tx, actor, 'order.thrown-away', { type: 'order', id }, { versionId });
    return done({});
  });
};
