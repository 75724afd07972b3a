import {
  WHOLE_BASIS_POINTS,
  moneyAllotted,
  moneyShare,
  moneyStepped,
  moneyTimes,
  ratioRounded,
  type Rounding,
} from './money';

/** One thing sold: so much at so much. */
export interface QuoteLineInput {
  readonly id: string;
  readonly name: string;
  /** To a millionth at most; finer is rounded. */
  readonly amount: number;
  /** `bags`, `hours`, `m²`: as it is printed. */
  readonly measure: string;
  /** What one costs the firm, minor units, 0 or more. */
  readonly costMinor: number;
}

/** A share as whole hundredths of a per cent: 2 000 is 20 %. */
export type BasisPoints = number;

/** The terms that a quote is worked out by. */
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

/** A line with its sums, minor units. */
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
  /** What rounding the total to the smallest coin adds or takes; 0 where the step is 1. */
  readonly roundingMinor: number;
  /** Net, tax and rounding. */
  readonly totalMinor: number;
  readonly on: string;
  /** The last day on which it holds. */
  readonly validUntil: string;
  /** How margin, tax and rounding were worked out, in words for the foot of the quote. */
  readonly words: readonly string[];
}

/** Labour as a line: hours, or square metres of floor, at a rate. */
export function labourLine(
  by: 'hour' | 'area',
  amount: number,
  rateMinor: number,
  measure = by === 'hour' ? 'hours' : 'm²',
): QuoteLineInput {
  return { id: `labour:${by}`, name: 'Labour', amount, measure, costMinor: rateMinor };
}

const MS_PER_DAY = 86_400_000;

/** A day so many days after another, both `2026-03-01`; a day is a day whatever the clock does. */
export function dayAfter(day: string, days: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + days * MS_PER_DAY).toISOString().slice(0, 10);
}

const percent = (share: BasisPoints): string => `${share / 100}\u202f%`;

/** How the figures came about, for the foot of the quote. */
function quoteWords({ margin, tax, rounding, currency }: QuoteTerms): string[] {
  const half = rounding.rule === 'halfUp' ? 'halves up' : 'halves to the even figure';
  return [
    `Margin ${percent(margin.share)} of ${margin.of === 'cost' ? 'cost' : 'the price without tax'}.`,
    tax.on === 'lines'
      ? `${tax.name} ${percent(tax.share)}, worked out and rounded on each line.`
      : `${tax.name} ${percent(tax.share)}, worked out once on the sum.`,
    `Rounded to ${currency}'s smallest unit, ${half}.`,
    ...(rounding.step > 1 ? [`The total is rounded to ${rounding.step} of them.`] : []),
  ];
}

/**
 * A quote's arithmetic. Each line's cost is rounded once; the margin is worked out on the sum of costs
 * and shared out by largest remainders, so that lines add up; tax likewise, or line by line as the
 * terms say. Throws on what the terms' schema rules out: a margin of the whole price or more, a
 * negative cost.
 */
export function quoteOf(input: readonly QuoteLineInput[], terms: QuoteTerms): Quote {
  const { margin, tax, rounding } = terms;
  const { rule } = rounding;
  if (margin.of === 'price' && margin.share >= WHOLE_BASIS_POINTS) {
    throw new Error('a margin of the whole price or more leaves no price');
  }
  const costs = input.map(({ amount, costMinor }) => moneyTimes(amount, costMinor, rule));
  const sum = (parts: readonly number[]) => parts.reduce((all, part) => all + part, 0);
  const cost = sum(costs);
  const wholeMargin =
    margin.of === 'cost'
      ? moneyShare(cost, margin.share, rule)
      : Number(
          ratioRounded(
            BigInt(cost) * BigInt(margin.share),
            BigInt(WHOLE_BASIS_POINTS - margin.share),
            rule,
          ),
        );
  const margins = moneyAllotted(wholeMargin, costs);
  const nets = costs.map((lineCost, n) => lineCost + margins[n]);
  const net = sum(nets);
  const taxes =
    tax.on === 'lines'
      ? nets.map((line) => moneyShare(line, tax.share, rule))
      : moneyAllotted(moneyShare(net, tax.share, rule), nets);
  const taxMinor = sum(taxes);
  const totalMinor = moneyStepped(net + taxMinor, rounding);
  return {
    currency: terms.currency,
    lines: input.map((line, n) => ({
      ...line,
      lineCostMinor: costs[n],
      marginMinor: margins[n],
      netMinor: nets[n],
      taxMinor: taxes[n],
      grossMinor: nets[n] + taxes[n],
    })),
    costMinor: cost,
    marginMinor: wholeMargin,
    netMinor: net,
    taxMinor,
    roundingMinor: totalMinor - net - taxMinor,
    totalMinor,
    on: terms.on,
    validUntil: dayAfter(terms.on, terms.validDays),
    words: quoteWords(terms),
  };
}
