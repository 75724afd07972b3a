import { and, eq } from 'drizzle-orm';
import Papa from 'papaparse';
import type { PurchaseOrder, SentOrder } from '@/api-types/purchase-orders';
import { suppliers } from '@/db/schema';
import { orderSheets, type OrderPaper } from '@/sheets/order-sheet';
import { moneyTimes, PLAIN_ROUNDING } from '@/takeoff/money';
import { moneyFigures } from '@/takeoff/money-figures';
import { textCellWritten } from '@/takeoff/text-cell';
import { pricingOf } from '../catalogue/pricing-settings';
import type { Db } from '../database';
import { done, type Outcome } from '../outcomes';
import { threadPdf } from '../pdf/pdf-thread';
import type { Actor } from '../permissions';
import { firmOnPaper, personName, versionOnPaper } from '../pricing/on-paper';
import type { SeenVersion } from '../seen-version';
import { today } from '../today';
import { openOrder, pricedOrder } from './orders';

export type UnsentOrder = Omit<SentOrder, 'number'>;
type OnPaper = UnsentOrder & { readonly number: string | null };

/** What an order would say if it were sent today by the actor. */
export const orderAsSent = async (
  db: Db,
  actor: Actor,
  version: SeenVersion,
  order: Pick<PurchaseOrder, 'lines' | 'deliveryDay' | 'deliveryPlace' | 'note'> & {
    readonly supplierId: string;
  },
): Promise<UnsentOrder> => {
  const settings = await pricingOf(db, actor.firmId);
  const [supplier] = await db
    .select({ name: suppliers.name, email: suppliers.email, address: suppliers.address })
    .from(suppliers)
    .where(and(eq(suppliers.firmId, actor.firmId), eq(suppliers.id, order.supplierId)));
  return {
    firm: await firmOnPaper(db, actor.firmId),
    supplier,
    version: versionOnPaper(version),
    sentBy: await personName(db, actor.personId),
    on: today(),
    currency: settings.currency,
    lines: order.lines.filter(({ amount }) => amount > 0),
    deliveryDay: order.deliveryDay,
    deliveryPlace: order.deliveryPlace,
    note: order.note,
    terms: settings.orderTerms,
    paper: settings.paper,
  };
};

const orderPaper = (order: OnPaper): OrderPaper => {
  const { firm } = order;
  return {
    size: order.paper,
    firm: {
      name: firm.name,
      lines: [
        ...firm.address.split('\n').filter(Boolean),
        ...[firm.phone, firm.email].filter(Boolean),
      ],
      registration: firm.registration,
    },
    supplier: order.supplier,
    number: order.number,
    on: order.on,
    orderedBy: order.sentBy,
    project: order.version.projectName,
    deliveryDay: order.deliveryDay,
    deliveryPlace: order.deliveryPlace,
    lines: order.lines,
    currency: order.currency,
    note: order.note,
    terms: order.terms,
  };
};

/** The order’s paper; one without a number is a draft. */
export const orderPdf = (order: OnPaper): Promise<Uint8Array<ArrayBuffer>> =>
  threadPdf(orderSheets(orderPaper(order)), {
    title: order.number === null ? 'Order (draft)' : `Order ${order.number}`,
    author: order.firm.name,
  });

const HEADINGS = [
  'Order',
  'Date',
  'Wanted on',
  'Deliver to',
  'Your code',
  'Item',
  'Packs',
  'Pack',
  'Pack holds',
  'Measure',
  'Price of a pack',
  'Sum',
  'Currency',
];

/** The order for the supplier's own system: a row a line, what is the same for all said in each. */
export const orderCsv = (order: OnPaper): string => {
  const rows = order.lines.map(({ name, code, pack, amount, costMinor }) => [
    textCellWritten(order.number ?? ''),
    order.on,
    order.deliveryDay ?? '',
    textCellWritten(order.deliveryPlace.replace(/\s*[\r\n]+\s*/g, ', ')),
    textCellWritten(code),
    textCellWritten(name),
    String(amount),
    textCellWritten(pack.name),
    String(pack.holds),
    pack.measure,
    costMinor === null ? '' : moneyFigures(costMinor, order.currency),
    costMinor === null
      ? ''
      : moneyFigures(moneyTimes(amount, costMinor, PLAIN_ROUNDING.rule), order.currency),
    order.currency,
  ]);
  return `\ufeff${Papa.unparse({ fields: HEADINGS, data: rows }, { newline: '\r\n' })}\r\n`;
};

const onPaper = async (db: Db, actor: Actor, id: string): Promise<Outcome<OnPaper>> => {
  const found = await pricedOrder(db, actor, id);
  if (!found.ok) return found;
  const { row, version } = found.value;
  if (row.order.sent) return done(row.order.sent);
  const detail = await openOrder(db, actor, id);
  if (!detail.ok) return detail;
  const draft = { ...detail.value, supplierId: row.order.supplierId };
  return done({ ...(await orderAsSent(db, actor, version, draft)), number: null });
};

/** The order as its supplier reads it: what was sent, or what a draft would say today. */
export const openOrderPdf = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Uint8Array>> => {
  const order = await onPaper(db, actor, id);
  return order.ok ? done(await orderPdf(order.value)) : order;
};

/** The order’s lines for a supplier’s own system, UTF-8 with a byte order mark. Not found and not allowed as the order is. */
export const openOrderCsv = async (
  db: Db,
  actor: Actor,
  id: string,
): Promise<Outcome<Uint8Array>> => {
  const order = await onPaper(db, actor, id);
  return order.ok ? done(new TextEncoder().encode(orderCsv(order.value))) : order;
};
