import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatLength, formatSize, parseLength } from '@/paving/length';

const mm = (text: string, display: 'metric' | 'imperial') => {
  const parsed = parseLength(text, display);
  return parsed.ok ? parsed.mm : parsed.message;
};

describe('parseLength', () => {
  it.each([
    ['3200', 3200],
    ['3.2m', 3200],
    ['3.2 m', 3200],
    ['3,2 m', 3200],
    ['3,200', 3200],
    ['3,200 mm', 3200],
    ['0,450 m', 450],
    ['3,250 m', 3250],
    ['3,25 m', 3250],
    ['0,450', 0.45],
    ['12,5cm', 125],
    ['1,234,567', 1_234_567],
    ['7 200 mm', 7200],
    ['7\u202f200\u202fmm', 7200],
    ['320cm', 3200],
    ['-12', -12],
    ['−12.5', -12.5],
    ['.5m', 500],
    ['2 m 40 cm', 2400],
    [`10'`, 3048],
  ])('reads %s in metric', (text, expected) => expect(mm(text, 'metric')).toBeCloseTo(expected, 9));

  it.each([
    [`10' 6 1/2"`, 126.5 * 25.4],
    [`10'6 1/2"`, 126.5 * 25.4],
    [`10’ 6½”`, 126.5 * 25.4],
    [`10′ 6½″`, 126.5 * 25.4],
    [`10''`, 254],
    ['10ft 6', 126 * 25.4],
    ['10 feet 6 inches', 126 * 25.4],
    ['126.5', 126.5 * 25.4],
    ['1/2', 12.7],
    ['6 1/2', 165.1],
    ['6 1/2"', 165.1],
    ['3/16"', (3 / 16) * 25.4],
    ['3.2m', 3200],
  ])('reads %s in imperial', (text, expected) =>
    expect(mm(text, 'imperial')).toBeCloseTo(expected, 9),
  );

  it.each(['', 'wide', '3 4', '1/0"', `6" 10'`, '3..2', '3m m', '1e3', 'Infinity'])(
    'refuses %j and says what would do',
    (text) => {
      const parsed = parseLength(text, 'metric');
      expect(parsed).toMatchObject({ ok: false, message: expect.stringContaining('3.2 m') });
    },
  );
});

describe('formatLength', () => {
  it.each([
    [7200, 'metric', 0, '7\u202f200\u202fmm'],
    [6.44, 'metric', 1, '6.4\u202fmm'],
    [6, 'metric', 1, '6\u202fmm'],
    [-0.01, 'metric', 1, '0\u202fmm'],
    [-12, 'metric', 0, '−12\u202fmm'],
    [3213.1, 'imperial', 0, `10' 6 1/2"`],
    [3048, 'imperial', 0, `10'`],
    [12.7, 'imperial', 0, `1/2"`],
    [0, 'imperial', 0, `0"`],
    [304.79, 'imperial', 0, `1'`],
  ] as const)('prints %d in %s with %d places as %s', (value, display, decimals, text) =>
    expect(formatLength(value, display, { decimals })).toBe(text),
  );

  it('prints a size with its unit once', () => {
    expect(formatSize(450, 450, 'metric')).toBe('450 × 450\u202fmm');
    expect(formatSize(203.2, 101.6, 'imperial')).toBe(`8" × 4"`);
  });

  it('prints nothing that it cannot read back, to the millimetre or the sixteenth', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -100_000, max: 100_000, noNaN: true }),
        fc.constantFrom('metric' as const, 'imperial' as const),
        (value, display) => {
          const read = parseLength(formatLength(value, display), display);
          return (
            read.ok && Math.abs(read.mm - value) <= (display === 'metric' ? 0.5 : 25.4 / 32) + 1e-9
          );
        },
      ),
    );
  });
});
