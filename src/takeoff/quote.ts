import type { Rounding } from './money';

/** One thing sold: so much at so much. */
export interface QuoteLineInput {
  readonly id: string;
  readonly name: string;
  /** To a millionth at most; finer is rounded. */
  readonly amount: number;
  /** `bags`, `hours`, `m²`: as it is printed. */
  readonly measure: string;
  /** What one costs the firm, minor units. */
  readonly costMinor: number;
}

/** A share as whole hundredths of a per cent: 2 000 is 20 %. */
export type BasisPoints = number;

export interface QuoteTerms {
  /** ISO 4217. */
  readonly currency: string;
  /** Of cost: 25 % of 100 makes 125. Of price: 25 % of the price, 100 makes 133.33. */
  readonly margin: { readonly of: 'cost' | 'price'; readonly share: BasisPoints };
  /** Worked out and rounded on each line, or once on the sum. */
  readonly tax: {
    readonly name: string;
    readonly share: BasisPoints;
    readonly on: 'lines' | 'sum';
  };
  readonly rounding: Rounding;
  /** The day of the quote, `2026-03-01`, and how many days it holds. */
  readonly on: string;
  readonly validDays: number;
}

export interface QuoteLine extends QuoteLineInput {
  /** Amount × cost, rounded. */
  readonly lineCostMinor: number;
  /** Its part of the margin; the parts add up to the quote's. */
  readonly marginMinor: number;
  /** Cost and margin, without tax. */
  readonly netMinor: number;
  /** Its tax, or its part of the sum's; the parts add up. */
  readonly taxMinor: number;
  readonly grossMinor: number;
}

/** Every figure is whole minor units; parts add up to their totals exactly. */
export interface Quote {
  readonly currency: string;
  readonly lines: readonly QuoteLine[];
  readonly costMinor: number;
  readonly marginMinor: number;
  readonly netMinor: number;
  readonly taxMinor: number;
  /** Net and tax. */
  readonly totalMinor: number;
  readonly on: string;
  /** The last day on which it holds. */
  readonly validUntil: string;
  /** How margin, tax and rounding were worked out, in words for the foot of the quote. */
  readonly words: readonly string[];
}
