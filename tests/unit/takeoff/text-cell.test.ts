import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { amountText } from '@/takeoff/amount-text';
import { boughtAs } from '@/takeoff/bought-as';
import { textCellRead, textCellWritten } from '@/takeoff/text-cell';

describe('text in a cell of a spreadsheet', () => {
  // OWASP, CSV Injection: the signs that begin a formula, their full-width kin, and the white space that hides one.
  test.each(['=1+1', '+44', '-2', '@SUM(A1)', '\t=1', '\r=1', '\n=1', '＝1', "'=1", "''-x"])(
    '%j is written so that no spreadsheet runs it, and is read back as it was',
    (text) => {
      expect(textCellWritten(text)).toMatch(/^'/);
      expect(textCellRead(textCellWritten(text))).toBe(text);
    },
  );

  test.each(['Slab', '450 × 450', "'tis", "O'Dell", '', '3 = 3'])('%j is left alone', (text) => {
    expect(textCellWritten(text)).toBe(text);
    expect(textCellRead(text)).toBe(text);
  });

  test('whatever text is written is read back exactly, and never begins with a sign that runs', () => {
    fc.assert(
      fc.property(
        fc.array(fc.constantFrom("'", '=', '+', '-', '@', '\t', 'a', ' ', '＝'), { maxLength: 8 }),
        (signs) => {
          const text = signs.join('');
          const cell = textCellWritten(text);
          expect(cell).not.toMatch(/^[=+\-@\t\r\n＝＋－＠]/);
          expect(textCellRead(cell)).toBe(text);
        },
      ),
    );
  });
});

test('amounts are written to a thousandth without noughts at the end', () => {
  expect([66, 2.125, 1240, 0.5, 1.0004, 12.1].map(amountText)).toEqual([
    '66',
    '2.125',
    '1\u202f240',
    '0.5',
    '1',
    '12.1',
  ]);
});

test('packs are said as they are bought', () => {
  const pack = (name: string, holds: number, measure: 'each' | 't') =>
    boughtAs({ name, holds, measure, whole: true });
  expect(pack('each', 1, 'each')).toBe('each');
  expect(pack('pallet', 288, 'each')).toBe('pallet of 288');
  expect(pack('bulk bag', 0.8, 't')).toBe('bulk bag of 0.8\u202ft');
});
