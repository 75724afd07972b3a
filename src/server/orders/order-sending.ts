import type { z } from 'zod';
import type { FieldProblem } from '@/api-types/problem';
import type {
  OrderElsewhere,
  orderSendSchema,
  PurchaseOrder,
  SentOrder,
} from '@/api-types/purchase-orders';
import { purchaseOrders } from '@/db/schema';
import { dayText } from '@/takeoff/day-text';
import { recordAudit } from '../audit';
import { pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { newId } from '../ids';
import type { Letter } from '../mail/letter';
import { attachment, postLetter } from '../mail/outbox';
import { changedMeanwhile, done, invalid, type Outcome } from '../outcomes';
import { pdfThreadBegun } from '../pdf/pdf-thread';
import type { Actor } from '../permissions';
import { personEmail } from '../pricing/on-paper';
import { nextNumber, numberedFile } from '../pricing/paper-numbers';
import { orderAsSent, orderCsv, orderPdf, type UnsentOrder } from './order-paper';
import { ofOrder } from './order-rows';
import { lockedOrder, openOrder, pricedOrder } from './orders';
import { lockProjectOrders, ordersElsewhere } from './orders-elsewhere';

/** What keeps an order from being sent as it stands. */
const orderFaults = ({ lines, supplier, deliveryDay, on }: UnsentOrder): FieldProblem[] => [
  ...(lines.length === 0 ? [{ path: ['lines'], message: 'There is nothing in this order' }] : []),
  ...lines
    .filter(({ amount, pack }) => pack.whole && !Number.isInteger(amount))
    .map(({ id, name, amount, pack }) => ({
      path: ['lines', id],
      message: `${name}: ${amount} is no whole number, and a ${pack.name} is sold whole only`,
    })),
  ...(supplier.email === ''
    ? [
        {
          path: ['supplier'],
          message: `${supplier.name} has no e-mail address. Give it one under Catalogue, Suppliers`,
        },
      ]
    : []),
  ...(deliveryDay !== null && deliveryDay < on
    ? [{ path: ['deliveryDay'], message: `${dayText(deliveryDay)} is past` }]
    : []),
];

const letterOf = (order: SentOrder): Letter => ({
  kind: 'purchase-order',
  subject: `Order ${order.number} from ${order.firm.name}`,
  name: order.supplier.name,
  blocks: [
    {
      kind: 'paragraph',
      text:
        `${order.firm.name} orders from you as set out in order ${order.number}, which goes with this letter as a PDF, and as a ` +
        `CSV file for your own system. ${
          order.deliveryDay === null
            ? 'Please tell us on which day you can deliver.'
            : `Please deliver on ${dayText(order.deliveryDay)}, or tell us if you cannot.`
        }`,
    },
    ...(order.deliveryPlace
      ? [{ kind: 'paragraph', text: `To:\n${order.deliveryPlace}` } as const]
      : []),
    ...(order.note ? [{ kind: 'quote', by: order.sentBy, text: order.note } as const] : []),
  ],
  why: `You get this letter because ${order.firm.name} buys from you. Answer it to reach ${order.sentBy}.`,
});

const elsewhereWords = (order: OrderElsewhere): string =>
  `Order ${order.number} went to ${order.supplier}, ${order.email}, on ${dayText(order.sentAt.slice(0, 10))} for version ${order.versionNumber} of ${order.layoutName}.`;

/**
 * Sends an order, once: numbered, frozen and written to the supplier with its PDF and CSV, all or nothing. The letter goes into
 * the outbox in the same transaction; whoever presses twice is told that it is sent.
 */
export const sendOrder = async (
  db: Db,
  actor: Actor,
  id: string,
  { revision, besides }: z.output<typeof orderSendSchema>,
): Promise<Outcome<PurchaseOrder>> => {
  const found = await pricedOrder(db, actor, id);
  if (!found.ok) return found;
  const { version } = found.value;
  // Read in beforehand: the transaction is not to wait for it.
  await pdfThreadBegun();
  const outcome = await db.transaction(async (tx): Promise<Outcome<null>> => {
    await lockProjectOrders(tx, version);
    const locked = await lockedOrder(tx, actor, id, revision);
    if (!locked.ok) return locked;
    const elsewhere = await ordersElsewhere(tx, version);
    const unknown = elsewhere.filter((other) => !besides.includes(other.id));
    if (unknown.length > 0) {
      return changedMeanwhile(
        `${unknown.map(elsewhereWords).join(' ')} Sending this one orders on top of that.`,
        { elsewhere },
      );
    }
    const unsent = await orderAsSent(tx, actor, version, locked.value);
    const faults = orderFaults(unsent);
    if (faults.length > 0) {
      return invalid(`${faults.map(({ message }) => message).join('. ')}.`, faults);
    }
    const { orderPrefix } = await pricingOf(tx, actor.firmId);
    const number = await nextNumber(tx, actor.firmId, 'order', orderPrefix);
    const sent: SentOrder = { ...unsent, number };
    const letterId = newId();
    await tx
      .update(purchaseOrders)
      .set({
        state: 'sent',
        number,
        sent,
        letterId,
        revision: revision + 1,
        sentBy: actor.personId,
        sentAt: new Date(),
        updatedAt: new Date(),
      })
      .where(ofOrder(actor.firmId, id));
    await recordAudit(
      tx,
      actor,
      'order.sent',
      { type: 'order', id },
      {
        number,
        supplier: sent.supplier.name,
        to: sent.supplier.email,
        versionId: version.id,
        project: version.projectName,
      },
    );
    await postLetter(
      tx,
      {
        id: letterId,
        to: sent.supplier.email,
        firmId: actor.firmId,
        replyTo: sent.firm.email || (await personEmail(tx, actor.personId)),
        attachments: [
          attachment(numberedFile('order', number, 'pdf'), 'application/pdf', await orderPdf(sent)),
          attachment(
            numberedFile('order', number, 'csv'),
            'text/csv; charset=utf-8',
            new TextEncoder().encode(orderCsv(sent)),
          ),
        ],
      },
      letterOf(sent),
    );
    return done(null);
  });
  return outcome.ok ? openOrder(db, actor, id) : outcome;
};
