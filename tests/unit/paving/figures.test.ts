import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatArea } from '@/paving/area';
import { formatCount } from '@/paving/count';
import { smallFigure } from '@/paving/small-figure';

describe('counts', () => {
  it('part thousands by a thin space that does not break', () => {
    // SI Brochure, 9th edition, 5.4.4 (from memory): groups of three, parted by a thin space.
    expect(formatCount(1373)).toBe('1\u202f373');
    expect(formatCount(999)).toBe('999');
    expect(formatCount(1234567)).toBe('1\u202f234\u202f567');
    expect(formatCount(-1000)).toBe('−1\u202f000');
    expect(formatCount(0)).toBe('0');
  });
});

describe('areas', () => {
  it('never read as nought where there is some', () => {
    expect(formatArea(0.0006, 'metric')).toBe('0.0006\u202fm²');
    expect(formatArea(0.045678, 'metric')).toBe('0.0457\u202fm²');
    expect(formatArea(0.09996, 'metric')).toBe('0.10\u202fm²');
    expect(formatArea(0.05, 'metric')).toBe('0.05\u202fm²');
    expect(formatArea(31.214, 'metric')).toBe('31.21\u202fm²');
    expect(formatArea(12345.6, 'metric')).toBe('12\u202f346\u202fm²');
  });

  it('are nought where they are but the noise of adding up', () => {
    for (const noise of [0, 1e-13, -3e-15])
      expect(formatArea(noise, 'metric')).toBe('0.00\u202fm²');
  });

  it('keep small values to within half of their third figure', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 0.0999, noNaN: true }), (value) => {
        const shown = Number(smallFigure(value, 2, 0.1));
        expect(Math.abs(shown - value) / value).toBeLessThan(0.005 + 1e-9);
      }),
    );
  });
});
