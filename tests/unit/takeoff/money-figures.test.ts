import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseMoney } from '@/takeoff/money';
import { moneyFigures } from '@/takeoff/money-figures';

// Figures after the point: ISO 4217, table A.1.
test.each([
  ['EUR', 123_450, '1234.50'],
  ['EUR', 5, '0.05'],
  ['EUR', -5, '-0.05'],
  ['JPY', 980, '980'],
  ['JPY', 0, '0'],
  ['KWD', 3125, '3.125'],
  ['KWD', 1, '0.001'],
])('%s %d is written %s', (currency, minor, figures) => {
  expect(moneyFigures(minor, currency)).toBe(figures);
});

test('what is written is read as the same amount', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 0, max: 1_000_000_000 }),
      fc.constantFrom('EUR', 'USD', 'JPY', 'KWD', 'RSD'),
      (minor, currency) => {
        expect(parseMoney(moneyFigures(minor, currency), currency)).toEqual({ ok: true, minor });
      },
    ),
  );
});
