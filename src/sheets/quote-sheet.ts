import { amountText } from '@/takeoff/amount-text';
import { dayText } from '@/takeoff/day-text';
import { formatMoney } from '@/takeoff/money';
import { businessSheets, type BusinessPaper, type PaperPart } from './business-paper';
import type { Sheet } from './sheet';

/** A quote as its client reads it: what is in it and what it comes to, neither cost nor margin. */
export interface QuotePaper {
  readonly size: 'A4' | 'Letter';
  readonly firm: BusinessPaper['firm'];
  readonly clientName: string;
  /** Null for a draft, which says so. */
  readonly number: string | null;
  /** Days such as `2026-03-01`. */
  readonly on: string;
  readonly validUntil: string;
  readonly preparedBy: string;
  readonly project: string;
  /** Layout and version, as sheets of the plan name them. */
  readonly floor: string;
  readonly fingerprint: string;
  readonly groups: readonly {
    readonly name: string;
    readonly lines: readonly {
      readonly name: string;
      readonly amount: number;
      readonly measure: string;
    }[];
    /** Without tax, minor units. */
    readonly netMinor: number;
  }[];
  readonly currency: string;
  readonly netMinor: number;
  readonly tax: { readonly name: string; readonly words: string; readonly minor: number };
  readonly roundingMinor: number;
  readonly totalMinor: number;
  readonly note: string;
  readonly terms: string;
}

/** The pages of a quote. */
export function quoteSheets(quote: QuotePaper): readonly Sheet[] {
  const money = (minor: number) => formatMoney(minor, quote.currency);
  const title = quote.number === null ? 'Quote (draft, not sent)' : `Quote ${quote.number}`;
  const parts: PaperPart[] = [
    { kind: 'paragraph', text: quote.note },
    ...quote.groups.flatMap(({ name, lines, netMinor }): PaperPart[] => [
      { kind: 'heading', text: name },
      {
        kind: 'table',
        table: {
          headings: ['What', 'Amount', 'Measure'],
          anchors: ['start', 'end', 'start'],
          rows: lines.map((line) => [line.name, amountText(line.amount), line.measure]),
        },
      },
      { kind: 'sums', sums: [{ name: `${name}, without tax`, figure: money(netMinor) }] },
    ]),
    { kind: 'heading', text: 'In all' },
    {
      kind: 'sums',
      sums: [
        { name: 'Without tax', figure: money(quote.netMinor) },
        { name: `${quote.tax.name} ${quote.tax.words}`, figure: money(quote.tax.minor) },
        ...(quote.roundingMinor === 0
          ? []
          : [{ name: 'Rounding', figure: money(quote.roundingMinor) }]),
        { name: 'Total', figure: money(quote.totalMinor), strong: true },
      ],
    },
    {
      kind: 'paragraph',
      text: `This quote holds until ${dayText(quote.validUntil)}. It is for the floor as drawn in ${quote.floor}, fingerprint ${quote.fingerprint}.`,
    },
    ...(quote.terms.trim() === ''
      ? []
      : ([
          { kind: 'heading', text: 'Terms' },
          { kind: 'paragraph', text: quote.terms },
        ] satisfies PaperPart[])),
  ];
  return businessSheets({
    size: quote.size,
    firm: quote.firm,
    to: [quote.clientName || 'To our client', quote.project],
    title,
    facts: [
      ...(quote.number === null ? [] : [['Number', quote.number] as const]),
      ['Date', dayText(quote.on)],
      ['Holds until', dayText(quote.validUntil)],
      ['Floor', quote.floor],
      ['Prepared by', quote.preparedBy],
    ],
    parts,
  });
}
