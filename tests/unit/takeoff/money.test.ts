import fc from 'fast-check';
import Fraction from 'fraction.js';
import { describe, expect, it, test } from 'vitest';
import {
  moneyAllotted,
  moneyShare,
  moneyStepped,
  moneyTimes,
  formatMoney,
  parseMoney,
  type RoundingRule,
} from '@/takeoff/money';

const minor = fc.integer({ min: -2_000_000_000, max: 2_000_000_000 });
const rule = fc.constantFrom<RoundingRule>('halfUp', 'halfEven');

/** Rounded with exact fractions, which share no code with the module. */
function exact(value: Fraction, by: RoundingRule): number {
  const size = value.abs();
  const floor = size.floor();
  const rest = size.sub(floor);
  const odd = Number(floor.mod(2)) === 1;
  const half = rest.compare(new Fraction(1, 2));
  const up = half > 0 || (half === 0 && (by === 'halfUp' || odd));
  const whole = Number(floor) + (up ? 1 : 0);
  return value.compare(0) < 0 && whole !== 0 ? -whole : whole;
}

describe('products and shares', () => {
  test('are what exact fractions round to', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 40_000_000 }), minor, rule, (parts, price, by) => {
        const amount = parts / 1000;
        expect(moneyTimes(amount, price, by)).toBe(exact(new Fraction(parts, 1000).mul(price), by));
      }),
    );
    fc.assert(
      fc.property(minor, fc.integer({ min: 0, max: 20_000 }), rule, (sum, share, by) => {
        expect(moneyShare(sum, share, by)).toBe(exact(new Fraction(sum).mul(share, 10_000), by));
      }),
    );
    fc.assert(
      fc.property(minor, fc.constantFrom(1, 5, 10, 25, 100), rule, (sum, step, by) => {
        expect(moneyStepped(sum, { rule: by, step })).toBe(
          exact(new Fraction(sum, step), by) * step,
        );
      }),
    );
  });

  it('refuse what is no whole number of minor units', () => {
    expect(() => moneyTimes(1, 0.5, 'halfUp')).toThrow(/whole minor units/);
    expect(() => moneyShare(NaN, 100, 'halfUp')).toThrow(/whole minor units/);
  });
});

test('parts add up to their total, and none is a whole unit off its exact share', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: 0, max: 5_000_000 }), { minLength: 1, maxLength: 30 }),
      minor,
      (weights, total) => {
        const parts = moneyAllotted(total, weights);
        expect(parts.reduce((sum, part) => sum + part, 0)).toBe(total);
        const all = weights.reduce((sum, weight) => sum + weight, 0);
        if (all === 0) return;
        parts.forEach((part, n) => {
          const share = new Fraction(total).mul(weights[n], all);
          expect(share.sub(part).abs().compare(1)).toBe(-1);
        });
      },
    ),
  );
});

test('money as text reads back as the same money', () => {
  fc.assert(
    fc.property(minor, fc.constantFrom('GBP', 'USD', 'EUR', 'JPY', 'KWD'), (sum, currency) => {
      expect(parseMoney(formatMoney(sum, currency), currency)).toEqual({ ok: true, minor: sum });
    }),
  );
});

describe('money as people type it', () => {
  it.each([
    ['1234.5', 'GBP', 123_450],
    ['1,234.50', 'GBP', 123_450],
    ['1 234,50', 'EUR', 123_450],
    ['£12', 'GBP', 1200],
    ['.5', 'USD', 50],
    ['1,234', 'USD', 123_400],
    ['1,234', 'JPY', 1234],
    ['1,234', 'KWD', 1234],
    ['-3.20', 'GBP', -320],
  ])('%s in %s', (text, currency, expected) => {
    expect(parseMoney(text, currency)).toEqual({ ok: true, minor: expected });
  });

  it.each([
    ['', 'GBP', /such as 1,234.50/],
    ['twelve', 'GBP', /such as 1,234.50/],
    ['1.234', 'GBP', /2 figures after the point/],
    ['1.5', 'JPY', /no smaller coin/],
  ])('%s in %s is refused with what would do', (text, currency, message) => {
    const read = parseMoney(text, currency);
    expect(read).toMatchObject({ ok: false, message: expect.stringMatching(message) });
  });
});
