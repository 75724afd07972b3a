import { amountText } from '@/takeoff/amount-text';
import { dayText } from '@/takeoff/day-text';
import { formatMoney, moneyTimes, PLAIN_ROUNDING } from '@/takeoff/money';
import { boughtAs } from '@/takeoff/bought-as';
import type { PriceItem } from '@/takeoff/price-list';
import { businessSheets, type BusinessPaper, type PaperPart } from './business-paper';
import type { Sheet } from './sheet';

/** An order as its supplier reads it. */
export interface OrderPaper {
  readonly size: 'A4' | 'Letter';
  readonly firm: BusinessPaper['firm'];
  readonly supplier: { readonly name: string; readonly address: string };
  /** Null for a draft, which says so. */
  readonly number: string | null;
  readonly on: string;
  readonly orderedBy: string;
  readonly project: string;
  readonly deliveryDay: string | null;
  readonly deliveryPlace: string;
  readonly lines: readonly {
    readonly name: string;
    readonly code: string;
    readonly pack: PriceItem['pack'];
    readonly amount: number;
    readonly costMinor: number | null;
  }[];
  readonly currency: string;
  readonly note: string;
  readonly terms: string;
}

/** The pages of an order. Prices are those that the firm expects; a column without any is left out. */
export function orderSheets(order: OrderPaper): readonly Sheet[] {
  const money = (minor: number) => formatMoney(minor, order.currency);
  const cost = (amount: number, minor: number) => moneyTimes(amount, minor, PLAIN_ROUNDING.rule);
  const coded = order.lines.some(({ code }) => code !== '');
  const priced = order.lines.some(({ costMinor }) => costMinor !== null);
  const total = order.lines.reduce(
    (sum, { amount, costMinor }) => sum + (costMinor === null ? 0 : cost(amount, costMinor)),
    0,
  );
  const parts: PaperPart[] = [
    { kind: 'paragraph', text: order.note },
    {
      kind: 'table',
      table: {
        headings: [
          'Item',
          ...(coded ? ['Your code'] : []),
          'Packs',
          'Pack',
          ...(priced ? ['A pack', 'Sum'] : []),
        ],
        anchors: [
          'start',
          ...(coded ? (['start'] as const) : []),
          'end',
          'start',
          ...(priced ? (['end', 'end'] as const) : []),
        ],
        rows: order.lines.map(({ name, code, pack, amount, costMinor }) => [
          name,
          ...(coded ? [code] : []),
          amountText(amount),
          boughtAs(pack),
          ...(priced
            ? costMinor === null
              ? ['–', '–']
              : [money(costMinor), money(cost(amount, costMinor))]
            : []),
        ]),
      },
    },
    ...(priced
      ? ([
          {
            kind: 'sums',
            sums: [{ name: 'Expected, without tax', figure: money(total), strong: true }],
          },
          {
            kind: 'paragraph',
            text: 'Prices are those of our list. Please tell us before you deliver if yours differ.',
          },
        ] satisfies PaperPart[])
      : []),
    { kind: 'heading', text: 'Delivery' },
    {
      kind: 'paragraph',
      text: [
        order.deliveryDay === null
          ? 'Please tell us the day on which you can deliver.'
          : `Please deliver on ${dayText(order.deliveryDay)}.`,
        order.deliveryPlace.trim() === '' ? '' : `To:\n${order.deliveryPlace}`,
      ]
        .filter(Boolean)
        .join('\n'),
    },
    ...(order.terms.trim() === ''
      ? []
      : ([
          { kind: 'heading', text: 'Terms' },
          { kind: 'paragraph', text: order.terms },
        ] satisfies PaperPart[])),
  ];
  return businessSheets({
    size: order.size,
    firm: order.firm,
    to: [order.supplier.name, ...order.supplier.address.split('\n').filter(Boolean)],
    title: order.number === null ? 'Order (draft, not sent)' : `Order ${order.number}`,
    facts: [
      ...(order.number === null ? [] : [['Number', order.number] as const]),
      ['Date', dayText(order.on)],
      ['Wanted on', order.deliveryDay === null ? 'to be agreed' : dayText(order.deliveryDay)],
      ['For', order.project],
      ['Ordered by', order.orderedBy],
    ],
    parts,
  });
}
