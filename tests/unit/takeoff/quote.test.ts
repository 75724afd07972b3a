import fc from 'fast-check';
import Fraction from 'fraction.js';
import { describe, expect, it, test } from 'vitest';
import { dayAfter, labourLine, quoteOf, type QuoteTerms } from '@/takeoff/quote';

const terms: QuoteTerms = {
  currency: 'GBP',
  margin: { of: 'cost', share: 2500 },
  tax: { name: 'VAT', share: 2000, on: 'sum' },
  rounding: { rule: 'halfUp', step: 1 },
  on: '2026-03-01',
  validDays: 30,
};
const item = (costMinor: number, amount = 1) => ({
  id: 'x',
  name: 'Slab',
  amount,
  measure: 'unit',
  costMinor,
});

const anyQuote = fc.record({
  lines: fc.array(
    fc.record({
      id: fc.constant('x'),
      name: fc.constant('Thing'),
      measure: fc.constant('t'),
      amount: fc.integer({ min: 0, max: 900_000 }).map((tenths) => tenths / 10),
      costMinor: fc.nat(250_000),
    }),
    { minLength: 1, maxLength: 25 },
  ),
  terms: fc.record({
    currency: fc.constantFrom('GBP', 'JPY', 'KWD'),
    margin: fc.record({
      of: fc.constantFrom('cost' as const, 'price' as const),
      share: fc.nat(9_000),
    }),
    tax: fc.record({
      name: fc.constant('VAT'),
      share: fc.nat(3_000),
      on: fc.constantFrom('lines' as const, 'sum' as const),
    }),
    rounding: fc.record({
      rule: fc.constantFrom('halfUp' as const, 'halfEven' as const),
      step: fc.constantFrom(1, 5),
    }),
    on: fc.constant('2026-03-01'),
    validDays: fc.nat(90),
  }),
});

test('every part is whole minor units, and lines add up to their totals', () => {
  fc.assert(
    fc.property(anyQuote, ({ lines, terms: by }) => {
      const quote = quoteOf(lines, by);
      const sum = (key: 'lineCostMinor' | 'marginMinor' | 'netMinor' | 'taxMinor' | 'grossMinor') =>
        quote.lines.reduce((all, line) => all + line[key], 0);
      expect(sum('lineCostMinor')).toBe(quote.costMinor);
      expect(sum('marginMinor')).toBe(quote.marginMinor);
      expect(sum('netMinor')).toBe(quote.netMinor);
      expect(sum('taxMinor')).toBe(quote.taxMinor);
      expect(sum('grossMinor') + quote.roundingMinor).toBe(quote.totalMinor);
      expect(quote.totalMinor % by.rounding.step).toBe(0);
      expect(Math.abs(quote.roundingMinor) * 2).toBeLessThanOrEqual(by.rounding.step);
      for (const line of quote.lines)
        for (const value of Object.values(line))
          if (typeof value === 'number' && value !== line.amount)
            expect(Number.isSafeInteger(value)).toBe(true);
    }),
  );
});

test('margin and tax on the sum are the exact shares, rounded once', () => {
  fc.assert(
    fc.property(anyQuote, ({ lines, terms: by }) => {
      const quote = quoteOf(lines, { ...by, tax: { ...by.tax, on: 'sum' } });
      const cost = new Fraction(quote.costMinor);
      const margin =
        by.margin.of === 'cost'
          ? cost.mul(by.margin.share, 10_000)
          : cost.div(new Fraction(10_000 - by.margin.share, 10_000)).sub(cost);
      const half = new Fraction(1, 2);
      expect(margin.sub(quote.marginMinor).abs().compare(half)).toBeLessThanOrEqual(0);
      const tax = new Fraction(quote.netMinor).mul(by.tax.share, 10_000);
      expect(tax.sub(quote.taxMinor).abs().compare(half)).toBeLessThanOrEqual(0);
    }),
  );
});

describe('a margin of a quarter', () => {
  it('of cost makes 125 of 100', () => {
    expect(quoteOf([item(10_000)], terms)).toMatchObject({ marginMinor: 2500, netMinor: 12_500 });
  });

  it('of price makes 133.33 of 100: a quarter of it is margin', () => {
    const quote = quoteOf([item(10_000)], { ...terms, margin: { of: 'price', share: 2500 } });
    expect(quote).toMatchObject({ marginMinor: 3333, netMinor: 13_333 });
    expect(quote.marginMinor / quote.netMinor).toBeCloseTo(0.25, 4);
  });

  it('of the whole price is refused', () => {
    expect(() => quoteOf([item(1)], { ...terms, margin: { of: 'price', share: 10_000 } })).toThrow(
      /no price/,
    );
  });
});

describe('tax', () => {
  const plain = { ...terms, margin: { of: 'cost', share: 0 } } as const;
  // Three lines of 0.02 at 20 %: each has 0.004 of tax, nothing once rounded; the sum has 0.012.
  it('line by line and on the sum may differ, and each says which it is', () => {
    const lines = [item(2), item(2), item(2)];
    const byLine = quoteOf(lines, { ...plain, tax: { ...plain.tax, on: 'lines' } });
    const onSum = quoteOf(lines, plain);
    expect([byLine.taxMinor, onSum.taxMinor]).toEqual([0, 1]);
    expect(byLine.words.join(' ')).toMatch(/on each line/);
    expect(onSum.words.join(' ')).toMatch(/once on the sum/);
    expect(onSum.lines.map(({ taxMinor }) => taxMinor)).toEqual([1, 0, 0]);
  });
});

it('labour is hours or square metres at a rate', () => {
  const quote = quoteOf([labourLine('hour', 12.5, 4200), labourLine('area', 31.2, 2600)], {
    ...terms,
    margin: { of: 'cost', share: 0 },
  });
  expect(quote.lines.map(({ lineCostMinor }) => lineCostMinor)).toEqual([52_500, 81_120]);
});

it('totals go to the smallest coin where that is not the smallest unit', () => {
  const quote = quoteOf([item(1002)], {
    ...terms,
    margin: { of: 'cost', share: 0 },
    tax: { ...terms.tax, share: 0 },
    rounding: { rule: 'halfUp', step: 5 },
  });
  expect(quote).toMatchObject({ netMinor: 1002, roundingMinor: -2, totalMinor: 1000 });
});

it('holds for so many days, over the end of February and the change of the clocks', () => {
  expect(dayAfter('2026-03-01', 30)).toBe('2026-03-31');
  expect(dayAfter('2028-02-28', 1)).toBe('2028-02-29');
  expect(dayAfter('2026-12-20', 30)).toBe('2027-01-19');
});
