import { describe, expect, it } from 'vitest';
import {
  currencyExponent,
  formatMoney,
  moneyAllotted,
  moneyShare,
  moneyTimes,
  ratioRounded,
} from '@/takeoff/money';

describe('rounding', () => {
  // NIST SP 811, B.7.1, rule 3 with its own examples: to seven digits 6.974 951 5 is 6.974 952 and
  // 6.974 950 5 is 6.974 950, the half going to the even digit; rules 1 and 2: to three digits 6.97.
  it('of halves to the even figure is that of NIST SP 811 B.7.1', () => {
    const digits = (value: bigint, drop: bigint) => ratioRounded(value, drop, 'halfEven');
    expect(digits(69749515n, 10n)).toBe(6974952n);
    expect(digits(69749505n, 10n)).toBe(6974950n);
    expect(digits(69749515n, 100_000n)).toBe(697n);
    expect(digits(69749515n, 1000n)).toBe(69750n);
  });

  it('of halves up differs only where the half goes to an odd figure', () => {
    expect(ratioRounded(69749505n, 10n, 'halfUp')).toBe(6974951n);
    expect(ratioRounded(69749515n, 10n, 'halfUp')).toBe(6974952n);
  });

  it('is the same below nought as above it', () => {
    for (const rule of ['halfUp', 'halfEven'] as const)
      for (const over of [5n, 15n, 25n, 149n, 151n])
        expect(ratioRounded(-over, 10n, rule)).toBe(-ratioRounded(over, 10n, rule));
  });
});

// The apportionment of 1790 by largest remainders (Hamilton's method), 60 seats among 15 states by
// the populations of that census, as electowiki.org, "Hamilton method", works it out.
it('shares out as Hamilton’s method shared 60 seats among the states of 1790', () => {
  const populations: [string, number, number][] = [
    ['Virginia', 630_560, 11],
    ['Massachusetts', 475_327, 8],
    ['Pennsylvania', 432_879, 7],
    ['North Carolina', 353_523, 6],
    ['New York', 331_589, 6],
    ['Maryland', 278_514, 5],
    ['Connecticut', 236_841, 4],
    ['South Carolina', 206_236, 3],
    ['New Jersey', 179_570, 3],
    ['New Hampshire', 141_822, 2],
    ['Vermont', 85_533, 1],
    ['Georgia', 70_835, 1],
    ['Kentucky', 68_705, 1],
    ['Rhode Island', 68_446, 1],
    ['Delaware', 55_540, 1],
  ];
  expect(populations.reduce((sum, [, people]) => sum + people, 0)).toBe(3_615_920);
  expect(
    moneyAllotted(
      60,
      populations.map(([, people]) => people),
    ),
  ).toEqual(populations.map(([, , seats]) => seats));
});

// ISO 4217, as Firefox's CurrencyDataGenerated.h (2026-01-01) is made from its list: two figures for the
// pound, the forint and the dinar of Serbia, none for the yen, three for the dinars of Kuwait and Iraq.
it('takes the minor units of ISO 4217, not those that people print', () => {
  expect(['GBP', 'HUF', 'RSD', 'JPY', 'KWD', 'IQD', 'CLF'].map(currencyExponent)).toEqual([
    2, 2, 2, 0, 3, 3, 4,
  ]);
  expect(formatMoney(123_450, 'GBP')).toBe('£1\u202f234.50');
  expect(formatMoney(123_450, 'JPY')).toBe('¥123\u202f450');
  expect(formatMoney(123_450, 'KWD')).toBe('KWD\u202f123.450');
});

it('keeps what floats lose', () => {
  // 1.005 × 100 is 100.49999999999999 in doubles; three things at 0.335 are 1.005.
  expect(moneyTimes(1.005, 100, 'halfUp')).toBe(101);
  expect(moneyTimes(0.1, 3, 'halfUp') + moneyTimes(0.2, 3, 'halfUp')).toBe(1);
  expect(moneyShare(50, 2050, 'halfUp')).toBe(10);
  expect(moneyShare(9_007_199_254_740_991, 10_000, 'halfUp')).toBe(9_007_199_254_740_991);
});
