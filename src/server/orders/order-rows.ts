import { and, eq } from 'drizzle-orm';
import type { PurchaseLine, PurchaseOrder } from '@/api-types/purchase-orders';
import { outbox, people, purchaseOrders, suppliers } from '@/db/schema';
import { moneyTimes, PLAIN_ROUNDING } from '@/takeoff/money';
import type { Db } from '../database';

/** One order of a firm. */
export const ofOrder = (firmId: string, id: string) =>
  and(eq(purchaseOrders.firmId, firmId), eq(purchaseOrders.id, id));

/** Orders with their supplier, sender and letter, in a query to be narrowed. */
export const orderRows = (db: Db) =>
  db
    .select({
      order: purchaseOrders,
      supplier: { id: suppliers.id, name: suppliers.name, email: suppliers.email },
      sender: { id: people.id, name: people.name },
      letter: { id: outbox.id, sentAt: outbox.sentAt, refusedAt: outbox.refusedAt },
    })
    .from(purchaseOrders)
    .innerJoin(
      suppliers,
      and(eq(suppliers.firmId, purchaseOrders.firmId), eq(suppliers.id, purchaseOrders.supplierId)),
    )
    .leftJoin(people, eq(people.id, purchaseOrders.sentBy))
    .leftJoin(outbox, eq(outbox.id, purchaseOrders.letterId))
    .$dynamic();

export type OrderRow = Awaited<ReturnType<typeof orderRows>>[number];

/** Of the lines that have a cost, minor units. */
const linesCost = (lines: readonly PurchaseLine[]): number =>
  lines.reduce(
    (sum, { amount, costMinor }) =>
      sum + (costMinor === null ? 0 : moneyTimes(amount, costMinor, PLAIN_ROUNDING.rule)),
    0,
  );

const letterState = ({ order, letter }: OrderRow): PurchaseOrder['letter'] => {
  if (order.state === 'draft') return null;
  // A letter that the outbox no longer knows went long ago.
  if (!letter || letter.sentAt) return 'sent';
  return letter.refusedAt ? 'refused' : 'waiting';
};

/** An order as the browser gets it; a sent one as it was sent. */
export const orderOf = (row: OrderRow, currency: string): PurchaseOrder => {
  const { order, supplier, sender } = row;
  const { sent } = order;
  return {
    id: order.id,
    versionId: order.versionId,
    state: order.state,
    number: order.number,
    revision: order.revision,
    supplier: sent
      ? { id: supplier.id, name: sent.supplier.name, email: sent.supplier.email }
      : supplier,
    lines: order.lines,
    deliveryDay: order.deliveryDay,
    deliveryPlace: order.deliveryPlace,
    note: order.note,
    currency: sent?.currency ?? currency,
    costMinor: linesCost(order.lines),
    createdAt: order.createdAt.toISOString(),
    sentAt: order.sentAt?.toISOString() ?? null,
    sentBy: sender,
    letter: letterState(row),
  };
};
